import { screen } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { leftOutInWords, sizeInWords } from "../../../src/features/replication/bundle-words.ts";
import ReplicationDialog from "../../../src/features/replication/replication-dialog.tsx";
import { answering, Refused, renderPart } from "../answering.tsx";

afterEach(() => vi.unstubAllGlobals());

const PATH = "POST /api/studies/s/replication-bundles";
const current = { name: "base", isCurrent: true };

function open(answer: unknown, cells = [current]) {
  const asked = answering({ [PATH]: answer });
  return { ...renderPart(<ReplicationDialog studyId="s" cells={cells} onClose={() => {}} />), asked };
}

describe("the replication bundle", () => {
  it("goes without the data unless its owner says otherwise, and is handed to the browser", async () => {
    const saved: string[] = [];
    vi.spyOn(URL, "createObjectURL").mockReturnValue("blob:bundle");
    vi.spyOn(HTMLAnchorElement.prototype, "click").mockImplementation(function click(this: HTMLAnchorElement) {
      saved.push(`${this.download} ${this.href}`);
    });
    const { user, asked } = open({});
    await user.click(screen.getByRole("button", { name: "Make the bundle" }));
    expect(await screen.findByText(/is with your browser's downloads/)).toBeInTheDocument();
    await user.click(screen.getByRole("radio", { name: /^go along/ }));
    await user.click(screen.getByRole("button", { name: "Make the bundle" }));
    await vi.waitFor(() => expect(saved).toEqual(["file blob:bundle", "file blob:bundle"]));
    expect(asked.map(({ body }) => body)).toEqual([{ data: "withheld" }, { data: "included" }]);
    vi.restoreAllMocks();
  });

  it("that is refused says why", async () => {
    const sentence = "base holds the address t@vihe.example, which would leave with the bundle: take it out first.";
    const { user } = open(new Refused(409, sentence));
    await user.click(screen.getByRole("button", { name: "Make the bundle" }));
    expect(await screen.findByRole("alert")).toHaveTextContent(sentence);
  });

  it("says beforehand what will not be in it", () => {
    open({}, [current, { name: "wide", isCurrent: false }]);
    expect(screen.getByText(/^wide is not current: what reads it stays out as well/)).toBeInTheDocument();
  });
});

describe("the words of a bundle", () => {
  it("name what is left out, and nothing where nothing is", () => {
    expect(leftOutInWords([current])).toBeUndefined();
    const out = ["a", "b"].map((name) => ({ name, isCurrent: false }));
    expect(leftOutInWords(out)).toMatch(/^a, b are not current: what reads them stays out/);
  });

  it.each([
    [1, "1 kB"],
    [840_400, "840 kB"],
    [12_440_000, "12.4 MB"],
  ])("%d bytes are %s", (bytes, words) => {
    expect(sizeInWords(bytes)).toBe(words);
  });
});
