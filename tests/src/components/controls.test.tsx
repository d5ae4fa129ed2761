import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it, vi } from "vitest";
import { Dialog } from "../../../src/components/dialog.tsx";
import { Field } from "../../../src/components/field.tsx";
import { Menu } from "../../../src/components/menu.tsx";
import { StateWords } from "../../../src/components/state-shape.tsx";
import { SwitchWords } from "../../../src/components/switch-words.tsx";

const WORDS = [
  { value: "form", word: "Form" },
  { value: "text", word: "Text" },
] as const;

/** A page that opens and leaves a dialog. */
function Page() {
  const [open, setOpen] = useState(true);
  return open ? (
    <Dialog title="People" lede="Who is here." onClose={() => setOpen(false)}>
      <button type="button">Add</button>
    </Dialog>
  ) : (
    <button type="button" onClick={() => setOpen(true)}>
      Open
    </button>
  );
}

describe("controls", () => {
  it("says which of two words is in use", async () => {
    const onChange = vi.fn();
    render(<SwitchWords label="Source as" words={WORDS} value="form" onChange={onChange} />);
    expect(screen.getByRole("group", { name: "Source as" })).toBeInTheDocument();
    expect(screen.getByRole("button", { name: "Form", pressed: true })).toBeInTheDocument();
    await userEvent.click(screen.getByRole("button", { name: "Text", pressed: false }));
    expect(onChange).toHaveBeenCalledWith("text");
  });

  it("reads a field's fault with the field", () => {
    render(<Field label="Email" fault="An e-mail address looks like name@place.example." hint="Yours." />);
    const field = screen.getByRole("textbox", { name: "Email" });
    expect(field).toBeInvalid();
    expect(field).toHaveAccessibleDescription("An e-mail address looks like name@place.example. Yours.");
  });

  it("lays a dialog over the page that Escape and Close leave", async () => {
    const user = userEvent.setup();
    render(<Page />);
    expect(screen.getByRole("dialog", { name: "People" })).toHaveAccessibleDescription("Who is here.");
    await user.keyboard("{Escape}");
    expect(screen.queryByRole("dialog")).not.toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "Open" }));
    await user.click(screen.getByRole("button", { name: "Close" }));
    expect(screen.queryByRole("dialog")).not.toBeInTheDocument();
  });

  it("opens a list of words from a word, by keyboard too", async () => {
    const user = userEvent.setup();
    const onSelect = vi.fn();
    render(
      <Menu
        trigger="More"
        label="More for base"
        groups={[
          [{ key: "rename", words: "Rename", onSelect }],
          [],
          [{ key: "down", words: "Move down", onSelect, disabled: true }],
        ]}
      />,
    );
    screen.getByRole("button", { name: "More for base" }).focus();
    await user.keyboard("{Enter}");
    expect(await screen.findByRole("menuitem", { name: "Move down" })).toHaveAttribute("aria-disabled", "true");
    await vi.waitFor(() => expect(screen.getByRole("menuitem", { name: "Rename" })).toHaveFocus());
    await user.keyboard("{Enter}");
    expect(onSelect).toHaveBeenCalledOnce();
  });

  it("gives every state a shape of its own beside its word", () => {
    const states = ["draft", "estimating", "current", "out of date", "failed"] as const;
    const shapes = states.map((state) => {
      const { container, unmount } = render(<StateWords state={state} words={state} />);
      expect(container).toHaveTextContent(state);
      const shape = container.querySelector("svg")!.innerHTML;
      unmount();
      return shape;
    });
    expect(new Set(shapes).size).toBe(states.length);
  });
});
