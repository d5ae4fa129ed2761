const WIDTH = 74;
const HEIGHT = 30;

interface EngelCurveProps {
  readonly logTotal: readonly number[];
  readonly shares: readonly number[];
  /** Top of the scale all goods have in common; it begins at 0. */
  readonly top: number;
}

/** A good's predicted share against ln x, small enough for the head of its column. */
export function EngelCurve({ logTotal, shares, top }: EngelCurveProps) {
  const [from, to] = [logTotal[0], logTotal[logTotal.length - 1]];
  const points = shares.map((share, index) => {
    const x = 1 + ((logTotal[index] - from) / (to - from)) * (WIDTH - 2);
    const y = HEIGHT - 1 - (Math.min(top, Math.max(0, share)) / top) * (HEIGHT - 3);
    return `${x.toFixed(1)} ${y.toFixed(1)}`;
  });
  return (
    <svg aria-hidden="true" viewBox={`0 0 ${WIDTH} ${HEIGHT}`} width={WIDTH} height={HEIGHT} className="ml-auto block">
      <path d={`M0 ${HEIGHT - 0.5}H${WIDTH}`} stroke="var(--rule2)" />
      <path d={`M${points.join("L")}`} fill="none" stroke="var(--s1)" strokeWidth="1.8" strokeLinejoin="round" />
    </svg>
  );
}

/** A round top for the common scale: the next 0.05 above every share. */
export function commonTop(shares: readonly (readonly number[])[]): number {
  return Math.ceil(Math.max(0.05, ...shares.flat()) * 20 - 1e-9) / 20;
}
