import type { ShownState } from "./state-shape.tsx";

/** A thing with a place in a list, and the places in that list of what it reads. */
export interface Stop {
  readonly id: string;
  readonly name: string;
  readonly state: ShownState;
  /** Ids of the stops it reads. */
  readonly reads: readonly string[];
}

export interface Arc {
  readonly from: Stop;
  readonly reader: Stop;
  /** Places in the list. */
  readonly start: number;
  readonly end: number;
}

/** From each stop to each that reads it; what reads itself or something that is not there has no arc. */
export function arcsOf(stops: readonly Stop[]): Arc[] {
  const place = new Map(stops.map(({ id }, index) => [id, index]));
  return stops.flatMap((reader, end) =>
    [...new Set(reader.reads)].flatMap((id) => {
      const start = place.get(id);
      return start === undefined || start === end ? [] : [{ from: stops[start], reader, start, end }];
    }),
  );
}

export const isDashed = ({ reader }: Arc) => reader.state === "out of date";

const LEAST_REACH = 16;
const REACH_PER_STOP = 9.5;

/** How far an arc bulges: more for each stop it passes, less where the margin has no room for the longest. */
export function reachOf(arc: Arc, arcs: readonly Arc[], room: number): number {
  const span = ({ start, end }: Arc) => Math.abs(end - start);
  const longest = Math.max(...arcs.map(span), 1);
  const least = Math.min(LEAST_REACH, room * 0.6);
  const step = Math.min(REACH_PER_STOP, (room - least) / longest);
  return least + step * span(arc);
}

/** A bracket bulging left from (x, from) to (x, to), level at both ends as a curve meets its tangent. */
export function bracket(x: number, from: number, to: number, reach: number): string {
  const down = to > from ? 1 : -1;
  const turn = down * Math.min(34 + reach * 0.15, Math.abs(to - from) / 2);
  const left = x - reach;
  const near = left + reach * 0.3;
  return [
    `M${x} ${from}`,
    `C${near} ${from} ${left} ${from + turn * 0.12} ${left} ${from + turn}`,
    `V${to - turn}`,
    `C${left} ${to - turn * 0.12} ${near} ${to} ${x} ${to}`,
  ].join("");
}

/** The same thread on its side: an arch over a line, from x to x. */
export function arch(from: number, to: number, base: number, tallest: number): string {
  const width = Math.abs(to - from);
  const height = Math.min(width <= 48 ? width / 2 : 24 + (width - 48) / 3, tallest);
  // A cubic's top stands at three quarters of its handles.
  const handle = base - height / 0.75;
  return `M${from} ${base}C${from} ${handle} ${to} ${handle} ${to} ${base}`;
}
