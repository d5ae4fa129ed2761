import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it, vi } from "vitest";
import { Thread } from "../../../src/components/thread.tsx";
import { ThreadAside } from "../../../src/components/thread-aside.tsx";
import { arch, arcsOf, bracket, reachOf, type Stop } from "../../../src/components/thread-geometry.ts";

const stops: (Stop & { y: number })[] = [
  { id: "s", name: "survey", state: "current", reads: [], y: 40 },
  { id: "b", name: "base", state: "current", reads: ["s"], y: 300 },
  { id: "m", name: "matrix", state: "current", reads: ["b"], y: 700 },
  { id: "l", name: "linear", state: "out of date", reads: ["s", "nowhere"], y: 990 },
];

function draw(focused?: string) {
  const onFollow = vi.fn();
  const onMove = vi.fn();
  render(
    <Thread
      stops={stops}
      width={84}
      height={1000}
      focused={focused}
      addressOf={(id) => `#${id}`}
      onFollow={onFollow}
      onMove={onMove}
    />,
  );
  return { onFollow, onMove, user: userEvent.setup() };
}

const line = (name: string) => screen.getByRole("link", { name }).querySelector(".thread-line");

describe("the thread", () => {
  it("leads from each cell to each that reads it, as links that say so", async () => {
    const { onFollow, user } = draw();
    expect(screen.getAllByRole("link").map((link) => link.getAttribute("aria-label"))).toEqual([
      "base reads survey",
      "matrix reads base",
      "linear reads survey",
    ]);
    await user.click(screen.getByRole("link", { name: "matrix reads base" }));
    expect(onFollow).toHaveBeenCalledWith("m");
  });

  it("dashes an arc whose reader is out of date, and lights those of the cell in focus", () => {
    draw("b");
    expect(line("linear reads survey")).toHaveAttribute("stroke-dasharray", "4 4");
    expect(line("base reads survey")).not.toHaveAttribute("stroke-dasharray");
    expect(line("base reads survey")).toHaveAttribute("stroke", "var(--accent)");
    expect(line("matrix reads base")).toHaveAttribute("stroke", "var(--accent)");
    expect(line("linear reads survey")).toHaveAttribute("stroke", "var(--ink2)");
  });

  it("moves from cell to cell with the arrows", async () => {
    const { onMove, user } = draw();
    screen.getByRole("link", { name: "base reads survey" }).focus();
    await user.keyboard("{ArrowDown}{ArrowUp}");
    expect(onMove.mock.calls).toEqual([[1], [-1]]);
  });

  it("reaches further for each cell it passes, and never beyond the margin", () => {
    const arcs = arcsOf(stops);
    expect(arcs.map((arc) => reachOf(arc, arcs, 60))).toEqual([25.5, 25.5, 44.5]);
    for (const arc of arcs) expect(reachOf(arc, arcs, 24)).toBeLessThanOrEqual(24);
  });

  it("meets both dots level, upwards as well as downwards", () => {
    for (const [from, to] of [
      [40, 300],
      [300, 40],
      [40, 52],
    ]) {
      const numbers = bracket(66, from, to, 25.5)
        .match(/-?[\d.]+/g)!
        .map(Number);
      const [x, y, , firstHandle] = numbers;
      const [, secondHandle, endX, endY] = numbers.slice(-4);
      expect([x, y, endX, endY]).toEqual([66, from, 66, to]);
      expect([firstHandle, secondHandle]).toEqual([from, to]);
    }
  });

  it("lies on its side in a list, and says what it draws", () => {
    render(
      <ThreadAside stops={stops.map((stop) => ({ ...stop, id: stop.name, reads: stop.reads.map(() => "survey") }))} />,
    );
    expect(
      screen.getByRole("img", { name: /^Cells survey, base, matrix, linear: base reads survey/ }),
    ).toBeInTheDocument();
    expect(arch(7, 31, 52, 44)).toBe("M7 52C7 36 31 36 31 52");
  });
});
