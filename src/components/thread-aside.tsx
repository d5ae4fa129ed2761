import { STATE_COLOURS, StateFigure } from "./state-shape.tsx";
import { arch, arcsOf, isDashed, type Stop } from "./thread-geometry.ts";

const GAP = 24;
const BASE = 52;
const TALLEST = 44;
const LONGEST = 232;

/** The thread on its side, small: a drawing that says in words what it shows. */
export function ThreadAside({ stops }: { stops: readonly Stop[] }) {
  if (stops.length === 0) return null;
  const gap = Math.min(GAP, (LONGEST - 14) / Math.max(1, stops.length - 1));
  const x = (index: number) => 7 + index * gap;
  const width = x(stops.length - 1) + 7;
  const arcs = arcsOf(stops);
  const reading = arcs.map(({ from, reader }) => `${reader.name} reads ${from.name}`).join(", ");
  return (
    <svg
      role="img"
      aria-label={`Cells ${stops.map(({ name }) => name).join(", ")}${reading ? `: ${reading}` : ""}`}
      width={width}
      height={BASE + 8}
      viewBox={`0 0 ${width} ${BASE + 8}`}
      fill="none"
      className="max-w-full"
    >
      <path d={`M${x(0)} ${BASE}H${x(stops.length - 1)}`} stroke="var(--rule)" strokeWidth="1.5" />
      {arcs.map((arc) => (
        <path
          key={`${arc.from.id} ${arc.reader.id}`}
          d={arch(x(arc.start), x(arc.end), BASE, TALLEST)}
          stroke="var(--ink2)"
          strokeWidth="1.15"
          strokeDasharray={isDashed(arc) ? "4 4" : undefined}
        />
      ))}
      {stops.map((stop, index) =>
        stop.state === "current" ? (
          <circle key={stop.id} cx={x(index)} cy={BASE} r="4.2" fill={STATE_COLOURS.current} />
        ) : (
          <g key={stop.id} transform={`translate(${x(index) - 5.5} ${BASE - 5.5})`}>
            <rect x="-0.5" y="-0.5" width="12" height="12" rx="6" fill="var(--recto)" />
            <StateFigure state={stop.state} />
          </g>
        ),
      )}
    </svg>
  );
}
