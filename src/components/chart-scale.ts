/** A linear axis: from values to pixels. */
export interface Scale {
  readonly from: number;
  readonly to: number;
  readonly at: (value: number) => number;
}

export function linearScale(from: number, to: number, start: number, end: number): Scale {
  return { from, to, at: (value) => start + ((value - from) / (to - from)) * (end - start) };
}

/** Ticks at 1, 2 or 5 times a power of ten, about so many, within the axis. */
export function roundTicks(from: number, to: number, about: number): { ticks: number[]; decimals: number } {
  const rough = (to - from) / about;
  const power = 10 ** Math.floor(Math.log10(rough));
  const distance = (size: number) => Math.abs(Math.log(size / rough));
  const [step] = [1, 2, 5, 10].map((multiple) => multiple * power).sort((a, b) => distance(a) - distance(b));
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  // Multiples are counted, not added up, so that nought is exactly nought.
  const ticks = Array.from({ length: Math.max(0, last - first + 1) }, (_, index) => (first + index) * step);
  return { ticks, decimals };
}
