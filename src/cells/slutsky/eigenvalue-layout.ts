import { type Interval, intervalOfEigenvalue } from "./intervals.ts";

/** An eigenvalue placed on its axis: interval and label, in a lane where no label meets another. */
export interface PlacedEigenvalue {
  readonly index: number;
  readonly lane: number;
  readonly x: number;
  readonly from: number;
  readonly to: number;
  /** Middle of the label, kept within the drawing. */
  readonly label: number;
}

const GAP = 10;

interface Measured {
  readonly value: number;
  readonly standardError: number;
  readonly interval?: Interval | undefined;
}

/** Gives each eigenvalue the first lane in which its label and bar are clear of those before it. */
export function placeEigenvalues(
  eigenvalues: readonly Measured[],
  at: (value: number) => number,
  labelWidth: number,
  width: number,
): PlacedEigenvalue[] {
  const ends: number[] = [];
  const order = eigenvalues.map((_, index) => index).sort((a, b) => eigenvalues[a].value - eigenvalues[b].value);
  return order.map((index) => {
    const { value } = eigenvalues[index];
    const [from, to] = intervalOfEigenvalue(eigenvalues[index]).map(at);
    const label = Math.min(width - labelWidth / 2, Math.max(labelWidth / 2, at(value)));
    const left = Math.min(from, label - labelWidth / 2);
    const right = Math.max(to, label + labelWidth / 2);
    const free = ends.findIndex((end) => end + GAP <= left);
    const lane = free < 0 ? ends.length : free;
    ends[lane] = right;
    return { index, lane, x: at(value), from, to, label };
  });
}

/** The least and greatest value the axis must show: every interval, and nought with room beyond it. */
export function eigenvalueRange(eigenvalues: readonly Measured[]): [from: number, to: number] {
  const lows = eigenvalues.map((one) => Math.min(one.value, intervalOfEigenvalue(one)[0]));
  const highs = eigenvalues.map((one) => Math.max(one.value, intervalOfEigenvalue(one)[1]));
  const low = Math.min(0, ...lows);
  const high = Math.max(0, ...highs);
  const span = high - low || 1;
  return [low - 0.08 * span, Math.max(high + 0.05 * span, 0.14 * span)];
}
