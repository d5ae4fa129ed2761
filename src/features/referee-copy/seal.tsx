/** One tangent of the seal: where it touches the circle and how far it reaches to either side. */
export interface SealTangent {
  readonly dot: readonly [x: number, y: number];
  readonly from: readonly [x: number, y: number];
  readonly to: readonly [x: number, y: number];
}

const CENTRE = 60;
const RADIUS = 25;

/** The sixteen tangents of a fingerprint: each byte pair places one (first byte) and measures it (second byte). */
export function sealTangents(fingerprint: string): SealTangent[] {
  return Array.from({ length: 16 }, (_, index) => {
    const place = Number.parseInt(fingerprint.slice(4 * index, 4 * index + 2), 16);
    const measure = Number.parseInt(fingerprint.slice(4 * index + 2, 4 * index + 4), 16);
    const angle = (2 * Math.PI * place) / 256;
    const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
    const dot = [CENTRE + RADIUS * cos, CENTRE + RADIUS * sin] as const;
    const along = (reach: number) => [dot[0] - sin * reach, dot[1] + cos * reach] as const;
    return { dot, from: along(-(8 + (44 * (measure >> 4)) / 15)), to: along(8 + (44 * (measure & 15)) / 15) };
  });
}

const at = ([x, y]: readonly [number, number]) => `${x.toFixed(2)} ${y.toFixed(2)}`;

/** A drawing of the fingerprint. It accompanies the hexadecimal and never replaces it. */
export function Seal({ fingerprint, className = "" }: { fingerprint: string; className?: string }) {
  const tangents = sealTangents(fingerprint);
  return (
    <svg aria-hidden="true" viewBox="0 0 120 120" className={`overflow-visible ${className}`}>
      <circle cx={CENTRE} cy={CENTRE} r={RADIUS} fill="none" stroke="var(--accent)" strokeWidth="1.6" />
      <path
        d={tangents.map(({ from, to }) => `M${at(from)}L${at(to)}`).join("")}
        stroke="var(--ink)"
        strokeWidth="0.7"
      />
      {tangents.map(({ dot: [x, y] }, index) => (
        <circle key={index} cx={x.toFixed(2)} cy={y.toFixed(2)} r="1.7" fill="var(--ink)" />
      ))}
    </svg>
  );
}
