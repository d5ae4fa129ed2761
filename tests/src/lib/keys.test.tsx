import { readdirSync, readFileSync } from "node:fs";
import { completionKeymap } from "@codemirror/autocomplete";
import { lintKeymap } from "@codemirror/lint";
import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import KeysDialog from "../../../src/app/keys-dialog.tsx";
import { commandOf, isSingleCharacter, KEYS, type KeyPlace } from "../../../src/lib/keys.ts";
import { chooseLetterKeys } from "../../../src/lib/preferences.ts";
import { type KeyActions, useKeys } from "../../../src/lib/use-keys.ts";

const SOURCES = `${process.cwd()}/src/`;
const places = Object.keys(KEYS) as KeyPlace[];
const all = places.flatMap((place) =>
  Object.entries(KEYS[place].commands).map(([name, command]) => ({ place, name, ...command })),
);

/** The event a stroke of the table stands for, as a keyboard sends it. */
function struck(stroke: string) {
  const parts = stroke.split("+");
  const key = parts.at(-1)!;
  const has = (modifier: string) => parts.slice(0, -1).includes(modifier);
  const controlled = has("Ctrl");
  return {
    key: key === "Space" ? " " : has("Shift") && key.length === 1 ? key.toUpperCase() : key,
    ctrlKey: controlled,
    metaKey: false,
    altKey: has("Alt"),
    shiftKey: has("Shift") || key === "?",
  };
}

afterEach(() => chooseLetterKeys(true));

/** A page with keys of its own, and something laid over it. */
function Page({ actions }: { actions: KeyActions<"anywhere"> }) {
  useKeys("anywhere", actions);
  return (
    <div role="dialog">
      <button type="button">In it</button>
    </div>
  );
}

describe("the table of keys", () => {
  it("finds every command by each of its strokes, in its own place", () => {
    for (const { place, name, strokes } of all) {
      for (const stroke of strokes)
        expect([place, stroke, commandOf(place, struck(stroke))]).toEqual([place, stroke, name]);
    }
  });

  it("has no stroke for two commands of one place, nor for a letter and a matrix at once", () => {
    for (const place of places) {
      const strokes = all.filter((one) => one.place === place).flatMap((one) => one.strokes);
      expect(new Set(strokes).size).toBe(strokes.length);
    }
  });

  it("takes Command for Ctrl, capital letters for small ones, and nothing with a modifier too many", () => {
    expect(commandOf("anywhere", { ...struck("Ctrl+z"), ctrlKey: false, metaKey: true })).toBe("undo");
    expect(commandOf("study", { ...struck("j"), key: "J" })).toBe("next");
    expect(commandOf("study", { ...struck("j"), altKey: true })).toBeUndefined();
    expect(commandOf("study", { ...struck("j"), ctrlKey: true })).toBeUndefined();
  });

  it("has none of the single characters while they are turned off, and all the others", () => {
    chooseLetterKeys(false);
    for (const { place, name, strokes } of all) {
      for (const stroke of strokes) {
        expect(commandOf(place, struck(stroke))).toBe(isSingleCharacter(stroke) ? undefined : name);
      }
    }
    expect(all.some(({ strokes }) => strokes.some(isSingleCharacter))).toBe(true);
  });
});

describe("what handles keys", () => {
  it("asks the table, and compares no key of its own", () => {
    const own = readdirSync(SOURCES, { recursive: true, encoding: "utf8" })
      .filter((path) => /\.tsx?$/.test(path) && !path.endsWith("lib/keys.ts"))
      .filter((path) =>
        /\b(event|nativeEvent)\.(key|code)\b(?!\s*===\s*KEY\b)/.test(readFileSync(SOURCES + path, "utf8")),
      );
    expect(own).toEqual([]);
  });

  it("asks in every place the table has", () => {
    const text = readdirSync(SOURCES, { recursive: true, encoding: "utf8" })
      .filter((path) => /\.tsx?$/.test(path) && !path.endsWith("lib/keys.ts"))
      .map((path) => readFileSync(SOURCES + path, "utf8"))
      .join("\n");
    const asked = places.filter((place) =>
      new RegExp(`(commandOf|useKeys)\\("${place}"|KEYS\\.${place}\\.`).test(text),
    );
    expect(asked).toEqual(places);
  });

  it("is of the editor what the editor binds", () => {
    const bound = new Set([...completionKeymap, ...lintKeymap].flatMap(({ key }) => key ?? []));
    const { leave: _, ...commands } = KEYS.source.commands;
    for (const { strokes } of Object.values(commands)) {
      const names = strokes.map((stroke) => stroke.replaceAll("+", "-"));
      expect(names.some((name) => bound.has(name) || bound.has(name.replace("Ctrl-", "Mod-")))).toBe(true);
    }
  });

  it("leaves a key it does not act on to others, and every key within a dialog", async () => {
    const help = vi.fn();
    const undo = vi.fn(() => false as const);
    render(<Page actions={{ help, undo, redo: () => {} }} />);
    const user = userEvent.setup();
    await user.keyboard("?");
    expect(help).toHaveBeenCalledOnce();
    const event = new KeyboardEvent("keydown", { ...struck("Ctrl+z"), bubbles: true, cancelable: true });
    document.body.dispatchEvent(event);
    expect([undo.mock.calls.length, event.defaultPrevented]).toEqual([1, false]);
    screen.getByRole("button").focus();
    await user.keyboard("?");
    expect(help).toHaveBeenCalledOnce();
  });
});

describe("the sheet of keys", () => {
  const listed = () =>
    [...document.querySelectorAll<HTMLElement>("[data-command]")].map(({ dataset, textContent }) => ({
      command: dataset.command,
      text: textContent ?? "",
    }));

  it("lists every command of the table, with its strokes and what it does, under where it acts", () => {
    render(<KeysDialog readOnly={false} onClose={() => {}} />);
    expect(listed().map(({ command }) => command)).toEqual(all.map(({ place, name }) => `${place} ${name}`));
    for (const { place, name, does, strokes } of all) {
      const line = listed().find(({ command }) => command === `${place} ${name}`)!;
      expect(line.text).toContain(does);
      expect(document.querySelectorAll(`[data-command="${place} ${name}"] kbd`)).toHaveLength(
        strokes.flatMap((stroke) => stroke.split("+")).length,
      );
      expect(screen.getByRole("region", { name: KEYS[place].where })).toBeInTheDocument();
    }
  });

  it("says which are turned off, and turns them on and off", async () => {
    render(<KeysDialog readOnly={false} onClose={() => {}} />);
    await userEvent.click(screen.getByRole("button", { name: "Off" }));
    const off = listed().filter(({ text }) => text.endsWith(", turned off"));
    expect(off).toHaveLength(all.filter(({ strokes }) => strokes.every(isSingleCharacter)).length);
    await userEvent.click(screen.getByRole("button", { name: "On" }));
    expect(listed().some(({ text }) => text.endsWith(", turned off"))).toBe(false);
  });

  it("offers those who only read nothing that changes the study", () => {
    render(<KeysDialog readOnly onClose={() => {}} />);
    expect(listed().map(({ command }) => command)).toEqual(
      all.flatMap((one) => ("changes" in one && one.changes ? [] : [`${one.place} ${one.name}`])),
    );
  });
});
