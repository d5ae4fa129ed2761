import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { tableCsv } from "../../../shared/tables/csv.ts";
import { slutskyTable } from "../../../shared/tables/slutsky-matrix.ts";
import { CopyTable } from "../../../src/cells/copy-table.tsx";
import { sampleSlutsky } from "../../support/sample-findings.ts";

const finding = sampleSlutsky();
const table = slutskyTable(finding, "share");

function clipboard(refuse = false) {
  const text: string[] = [];
  const items: Record<string, Blob>[] = [];
  vi.stubGlobal(
    "ClipboardItem",
    class {
      constructor(kinds: Record<string, Blob>) {
        items.push(kinds);
      }
    },
  );
  const user = userEvent.setup();
  vi.spyOn(navigator.clipboard, "writeText").mockImplementation(async (one) => {
    if (refuse) throw new DOMException("not allowed");
    text.push(one);
  });
  vi.spyOn(navigator.clipboard, "write").mockResolvedValue();
  render(<CopyTable table={table} />);
  return { text, items, user };
}

const content = (blob: Blob) =>
  new Promise<string>((resolve) => {
    const reader = new FileReader();
    reader.onload = () => resolve(String(reader.result));
    reader.readAsText(blob);
  });

describe("copying a table", () => {
  afterEach(() => {
    vi.unstubAllGlobals();
    vi.restoreAllMocks();
  });

  it("puts an HTML table beside tab-separated text", async () => {
    const { items, user } = clipboard();
    await user.click(screen.getByRole("button", { name: /^Copy as table/ }));
    expect(await screen.findByText("Copied as table")).toBeInTheDocument();
    const [kinds] = items;
    expect(await content(kinds["text/plain"])).toContain("grains\testimate\t-0.0744\t0.0238");
    expect(await content(kinds["text/html"])).toMatch(/^<table><caption>Slutsky matrix, share form, at the base point/);
  });

  it("puts LaTeX and CSV as text", async () => {
    const { text, user } = clipboard();
    await user.click(screen.getByRole("button", { name: /^Copy as LaTeX/ }));
    await user.click(screen.getByRole("button", { name: /^Copy as CSV/ }));
    expect(await screen.findByText("Copied as CSV")).toBeInTheDocument();
    expect(text[0]).toContain("\\toprule");
    expect(text[1]).toContain(String(finding.at.share[0][0]));
  });

  it("hands the browser a file of the same CSV", async () => {
    const { user } = clipboard();
    const files: Blob[] = [];
    vi.spyOn(URL, "createObjectURL").mockImplementation((file) => {
      files.push(file as Blob);
      return "blob:table";
    });
    const names: string[] = [];
    vi.spyOn(HTMLAnchorElement.prototype, "click").mockImplementation(function click(this: HTMLAnchorElement) {
      names.push(this.download);
    });
    await user.click(screen.getByRole("button", { name: /^Download as CSV/ }));
    expect(names).toEqual([`${table.name}.csv`]);
    expect(await content(files[0])).toBe(tableCsv(table));
  });

  it("says so when the browser does not let it", async () => {
    const { user } = clipboard(true);
    await user.click(screen.getByRole("button", { name: /^Copy as CSV/ }));
    expect(await screen.findByText(/does not let this page write/)).toBeInTheDocument();
  });
});
