import { render, screen, waitFor, within } from "@testing-library/react";
import { afterEach, beforeEach, expect, test, vi } from "vitest";
import { engelFigure } from "../../../src/cells/system/engel-figure.ts";
import { EngelView } from "../../../src/cells/system/engel-view.tsx";
import { standApart, ticksBetween } from "../../../src/components/plot-series.ts";
import { sampleSystem } from "../../support/sample-findings.ts";

const drawn = vi.hoisted(() => ({ react: vi.fn(), purge: vi.fn(), downloadImage: vi.fn() }));
vi.mock("plotly.js-dist-min", () => ({ default: drawn }));

const finding = sampleSystem();
let nearWindow: (() => void) | undefined;

beforeEach(() => {
  nearWindow = undefined;
  vi.stubGlobal(
    "IntersectionObserver",
    class {
      constructor(seen: (entries: { isIntersecting: boolean }[]) => void) {
        nearWindow = () => seen([{ isIntersecting: true }]);
      }
      observe() {}
      disconnect() {}
    },
  );
});
afterEach(() => {
  vi.unstubAllGlobals();
  vi.clearAllMocks();
});

test("the numbers of the curves stand as a table, whether or not the figure is drawn", () => {
  render(<EngelView finding={finding} />);
  const table = screen.getByRole("table", { hidden: true });
  expect(within(table).getAllByRole("row", { hidden: true })).toHaveLength(1 + finding.engel.logTotal.length);
});

test("the figure is drawn once it comes near the window, and not before", async () => {
  render(<EngelView finding={finding} />);
  await new Promise((later) => setTimeout(later, 20));
  expect(drawn.react).not.toHaveBeenCalled();

  nearWindow?.();

  await waitFor(() => expect(drawn.react).toHaveBeenCalled());
  const [, data] = drawn.react.mock.lastCall ?? [];
  expect(data).toHaveLength(finding.fitted.goods.length);
  expect(data[1].y).toEqual(finding.engel.shares[1]);
  expect(data[1].x).toEqual(finding.engel.logTotal.map(Math.exp));
});

test("beyond six goods the colours come again, dashed", () => {
  const goods = Array.from({ length: 8 }, (_, i) => `good ${i}`);
  const engel = { logTotal: [0, 1], shares: goods.map((_, i) => [0.125, i / 28]) };
  const { data } = engelFigure({ engel, fitted: { goods } }, (name) => name);
  const lines = data.map((one) => (one as { line: { color: string; dash: string } }).line);
  expect([lines[0], lines[6]]).toMatchObject([
    { color: "s1", dash: "solid" },
    { color: "s1", dash: "dash" },
  ]);
});

test("labels at the lines' ends stand apart and keep their order", () => {
  const placed = standApart([0.3, 0.1, 0.11, 0.12], 0.05);
  [0.3, 0.1, 0.15, 0.2].forEach((place, i) => {
    expect(placed[i]).toBeCloseTo(place, 12);
  });
});

test("the axis is marked at numbers that begin with 1, 2 or 5", () => {
  expect(ticksBetween(0.32, 3.1)).toEqual([0.5, 1, 2]);
  expect(ticksBetween(90, 2100)).toEqual([100, 200, 500, 1000, 2000]);
});
