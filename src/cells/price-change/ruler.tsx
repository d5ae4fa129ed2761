import { type KeyboardEvent, useId } from "react";
import { printFixed, THIN_SPACE } from "../../../shared/tables/numbers.ts";
import { commandOf } from "../../lib/keys.ts";
import { TextControl } from "../form/fields.tsx";
import { asNumber } from "../form/number-field.tsx";
import type { RulerScale } from "./ruler-scale.ts";

const TICKS = { short: 4, long: 7, rest: 12 } as const;
const MIDDLE = 12;
const STEPS = { more: 1, less: -1, muchMore: 5, muchLess: -5 } as const;

interface RulerProps {
  readonly scale: RulerScale;
  /** Whether it stands elsewhere than in the stored question. */
  readonly isMoved: boolean;
  readonly onMove: (value: number) => void;
}

/** A change of price as a ruler with a handle, and as a number beside its name. */
export function Ruler({ scale, isMoved, onMove }: RulerProps) {
  const id = useId();
  const { name, kind, isPercent, value, rest, min, max, step } = scale;
  const printed = printRate(scale);
  const move = (next: number) => onMove(tidy(Math.min(max, Math.max(min, next)), step));
  const onKeyDown = (event: KeyboardEvent) => {
    const command = commandOf("ruler", event);
    if (command === undefined) return;
    event.preventDefault();
    move(value + STEPS[command] * step);
  };
  const at = (Math.min(max, Math.max(min, value)) - min) / (max - min);
  return (
    <div className="pt-1.5">
      <div className="flex items-end justify-between gap-3">
        <span id={id} className="min-w-0 text-[0.875rem]/[1.25rem]">
          {name}
          {kind && <i className="ml-2 whitespace-nowrap font-serif text-ink2">{kind}</i>}
        </span>
        <span
          className={`w-16 shrink-0 text-right tabular-nums [&_input]:text-right ${isMoved ? "font-semibold" : ""}`}
        >
          <TextControl
            aria-label={`${name}${isPercent ? ", per cent" : ""}, as a number`}
            value={printed}
            numeric
            readOnly={false}
            onCommit={(text) => {
              const typed = asNumber(text.replace(/[%\s\u2009]/g, "").replace(/^\+/, ""));
              if (typeof typed === "number" && (!isPercent || typed > -100)) onMove(typed);
            }}
          />
        </span>
      </div>
      <div className="ruler">
        <input
          type="range"
          aria-labelledby={id}
          aria-valuetext={printed}
          min={min}
          max={max}
          step="any"
          value={value}
          onChange={(event) => move(nearest(Number(event.target.value), rest, step))}
          onKeyDown={onKeyDown}
        />
        <RulerDrawing scale={scale} at={at} />
      </div>
    </div>
  );
}

function RulerDrawing({ scale: { marks, min, max, rest, value }, at }: { scale: RulerScale; at: number }) {
  const percent = (part: number) => `${100 * part}%`;
  const origin = Math.min(1, Math.max(0, (rest - min) / (max - min)));
  const colour = value === rest ? "var(--ink)" : "var(--accent)";
  return (
    <svg aria-hidden="true" width="100%" height="24">
      <line x1="0" x2="100%" y1={MIDDLE} y2={MIDDLE} stroke="var(--ctl)" />
      {marks.map((mark) => (
        <line
          key={mark.at}
          x1={percent(mark.at)}
          x2={percent(mark.at)}
          y1={MIDDLE}
          y2={MIDDLE + TICKS[mark.size]}
          stroke="var(--ctl)"
        />
      ))}
      <line x1={percent(origin)} x2={percent(at)} y1={MIDDLE} y2={MIDDLE} stroke="var(--accent)" strokeWidth="3" />
      <line x1={percent(at)} x2={percent(at)} y1={MIDDLE - 8} y2={MIDDLE + 8} stroke={colour} strokeWidth="2" />
      <circle cx={percent(at)} cy={MIDDLE} r="4.6" fill={colour} />
    </svg>
  );
}

/** To the nearest step counted from where nothing changes. */
const nearest = (value: number, rest: number, step: number) =>
  tidy(rest + Math.round((value - rest) / step) * step, step);

/** A sum of steps without the rounding of its last digits. */
function tidy(value: number, step: number): number {
  const decimals = Math.max(0, 2 - Math.floor(Math.log10(step)));
  return Number(value.toFixed(Math.min(12, decimals)));
}

/** "+40 %", "−5 %", "31.00": as the number field shows it. */
function printRate({ value, isPercent, step }: RulerScale): string {
  if (!isPercent) return printFixed(value, Math.max(2, -Math.floor(Math.log10(step))));
  const decimals = Number.isInteger(value) ? 0 : 1;
  return `${value > 0 ? "+" : ""}${printFixed(value, decimals)}${THIN_SPACE}%`;
}
