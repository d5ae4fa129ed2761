import type { KeyboardEvent, MouseEvent } from "react";
import { commandOf } from "../lib/keys.ts";
import { STATE_COLOURS, StateFigure } from "./state-shape.tsx";
import { type Arc, arcsOf, bracket, isDashed, reachOf, type Stop } from "./thread-geometry.ts";

export interface PlacedStop extends Stop {
  /** Where its name stands, in pixels from the top. */
  readonly y: number;
}

interface ThreadProps {
  readonly stops: readonly PlacedStop[];
  readonly width: number;
  readonly height: number;
  /** The stop in focus: its arcs and its readers' are drawn in the accent. */
  readonly focused?: string;
  readonly addressOf: (id: string) => string;
  readonly onFollow: (id: string) => void;
  /** The arrow keys, while the thread has the focus. */
  readonly onMove: (by: 1 | -1) => void;
}

const touches = (arc: Arc, id: string | undefined) => id !== undefined && (arc.from.id === id || arc.reader.id === id);

/** What reads what, in the margin: a dot at each name, an arc from each to its readers. The arcs are links. */
export function Thread({ stops, width, height, focused, addressOf, onFollow, onMove }: ThreadProps) {
  const arcs = arcsOf(stops);
  const dot = width - Math.min(18, width * 0.28);
  const yOf = new Map(stops.map(({ id, y }) => [id, y]));
  const follow = (event: MouseEvent, id: string) => {
    event.preventDefault();
    onFollow(id);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const command = commandOf("thread", event);
    if (!command) return;
    event.preventDefault();
    onMove(command === "next" ? 1 : -1);
  };
  return (
    <nav aria-label="What reads what" className="thread" onKeyDown={onKeyDown}>
      <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} fill="none" className="block">
        <title>What reads what</title>
        {arcs
          .toSorted((a, b) => Number(touches(a, focused)) - Number(touches(b, focused)))
          .map((arc) => {
            const path = bracket(
              dot,
              yOf.get(arc.from.id) ?? 0,
              yOf.get(arc.reader.id) ?? 0,
              reachOf(arc, arcs, dot - 7),
            );
            const lit = touches(arc, focused);
            return (
              <a
                key={`${arc.from.id} ${arc.reader.id}`}
                href={addressOf(arc.reader.id)}
                aria-label={`${arc.reader.name} reads ${arc.from.name}`}
                onClick={(event) => follow(event, arc.reader.id)}
                className="thread-arc"
              >
                <path d={path} stroke="transparent" strokeWidth="12" pointerEvents="stroke" />
                <path
                  d={path}
                  className="thread-line"
                  stroke={lit ? "var(--accent)" : "var(--ink2)"}
                  strokeWidth={lit ? 1.6 : 1.15}
                  strokeDasharray={isDashed(arc) ? "4 4" : undefined}
                />
              </a>
            );
          })}
        {stops.map((stop) => (
          <Dot key={stop.id} stop={stop} x={dot} width={width} />
        ))}
      </svg>
    </nav>
  );
}

function Dot({ stop, x, width }: { stop: PlacedStop; x: number; width: number }) {
  const plain = stop.state === "current";
  return (
    <g data-state={stop.state}>
      <path d={`M${x} ${stop.y}H${width}`} stroke="var(--ink)" strokeWidth="1.15" />
      {plain ? (
        <circle cx={x} cy={stop.y} r="4.4" fill={STATE_COLOURS.current} />
      ) : (
        <g transform={`translate(${x - 5.5} ${stop.y - 5.5})`}>
          <rect x="-0.5" y="-0.5" width="12" height="12" rx="6" fill="var(--paper)" />
          <StateFigure state={stop.state} />
        </g>
      )}
    </g>
  );
}
