/** Of one good, in per cent of what is bought before. */
export interface EffectParts {
  readonly substitution: number;
  readonly income: number;
  readonly both: number;
}

const WIDTH = 110;
const PAD = 6;

/** How far the bars of all goods reach, so that one scale serves them all. */
export function reachOfBars(all: readonly EffectParts[]): readonly [number, number] {
  const ends = all.flatMap(({ substitution, both }) => [0, substitution, both]);
  return [Math.min(...ends), Math.max(...ends)];
}

/** Substitution solid, income hatched from where it ends, a square where both arrive; the numbers stand beside. */
export function EffectBarsOf({
  parts: { substitution, both },
  reach: [low, high],
  hatch,
}: {
  parts: EffectParts;
  reach: readonly [number, number];
  hatch: string;
}) {
  const span = high - low || 1;
  const at = (value: number) => PAD + ((value - low) / span) * (WIDTH - 2 * PAD);
  const bar = (from: number, to: number, y: number, fill: string, stroke: string) => (
    <rect
      x={Math.min(at(from), at(to))}
      y={y}
      width={Math.max(0.5, Math.abs(at(to) - at(from)))}
      height="6"
      fill={fill}
      stroke={stroke}
    />
  );
  return (
    <svg aria-hidden="true" width={WIDTH} height="30" className="inline-block">
      <path d={`M${at(0)} 2V28`} stroke="var(--ctl)" />
      {bar(0, substitution, 6, "var(--n4)", "var(--n4)")}
      {bar(substitution, both, 17, `url(#${hatch})`, "var(--p4)")}
      <rect x={at(both) - 3} y="17" width="6" height="6" fill="var(--ink)" />
    </svg>
  );
}
