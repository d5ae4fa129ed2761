import { useId, useMemo } from "react";
import { type Compensation, onePrice } from "../../../../shared/economics/price-change/one-price.ts";
import type { PriceChangeFinding } from "../../../../shared/schemas/price-change.ts";
import { capital } from "../../../../shared/study/words.ts";
import { digitsForAll, printFixed } from "../../../../shared/tables/numbers.ts";
import { BottomAxis } from "../../../components/chart-axis.tsx";
import { useChartWidth } from "../../../components/chart-width.ts";
import { EffectAxis } from "./effect-axis.tsx";
import { type Frame, frameOf } from "./frame.ts";
import { LineNames } from "./line-names.tsx";
import { Lines } from "./lines.tsx";
import { Bundles } from "./marks.tsx";
import { PictureNumbers } from "./picture-numbers.tsx";
import { pictureWords } from "./picture-words.ts";

const TOP = 30;
const LEFT = 46;
/** Room for the names of lines. */
const RIGHT = 84;
const DRAWN_FOR = 430;

interface PictureProps {
  readonly finding: PriceChangeFinding;
  readonly good: string;
  readonly by: Compensation;
}

/** One price change: a good against everything else, with budgets, indifference curves and bundles. */
export function PriceChangePicture({ finding, good, by }: PictureProps) {
  const [clip, hatch] = [useId(), useId()];
  const [ref, width] = useChartWidth<HTMLDivElement>(DRAWN_FOR);
  const one = useMemo(() => onePrice(finding, good, by), [finding, good, by]);
  const height = Math.round(Math.min(410, Math.max(300, width * 0.8)));
  const bottom = height - 62;
  const edges = { left: LEFT, right: width - RIGHT, top: TOP, bottom };
  const frame = frameOf(one, edges);
  const { decimals } = digitsForAll([one.bundles.before.quantity]);
  const digits = Math.min(decimals, 3);
  const words = pictureWords(one, frame, by);
  return (
    <div ref={ref}>
      {words.notes.map((note) => (
        <p key={note} className="type-small text-ink2">
          {note}
        </p>
      ))}
      <svg
        role="img"
        aria-label={words.label}
        width="100%"
        height={height}
        className="mt-2 block font-sans text-[0.8125rem] tabular-nums"
      >
        <defs>
          <clipPath id={clip}>
            <rect x={LEFT} y={TOP} width={Math.max(0, edges.right - LEFT)} height={bottom - TOP} />
          </clipPath>
        </defs>
        <text x="0" y="14" fill="var(--ink2)">
          everything else, money
        </text>
        <LeftAxis frame={frame} edges={edges} />
        <Lines frame={frame} one={one} clip={clip} />
        <LineNames frame={frame} one={one} by={by} />
        <Bundles frame={frame} one={one} bottom={bottom} />
        <BottomAxis
          scale={frame.x}
          y={bottom}
          ticks={frame.xTicks.ticks}
          print={(tick) => printFixed(tick, frame.xTicks.decimals)}
        />
        <EffectAxis frame={frame} one={one} y={bottom + 33} decimals={digits} hatch={hatch} />
        <text x={width} y="14" textAnchor="end" fill="var(--ink2)">
          across: {capital(good)}, quantity
        </text>
      </svg>
      <PictureNumbers one={one} by={by} decimals={decimals} />
    </div>
  );
}

interface AxisProps {
  readonly frame: Frame;
  readonly edges: { readonly left: number; readonly top: number; readonly bottom: number };
}

function LeftAxis({ frame: { y, yTicks }, edges: { left, top, bottom } }: AxisProps) {
  return (
    <g>
      <path d={`M${left} ${top}V${bottom}`} stroke="var(--ctl)" />
      {yTicks.ticks.map((tick) => (
        <g key={tick}>
          <path d={`M${left - 4} ${y.at(tick)}h4`} stroke="var(--ctl)" />
          <text x={left - 8} y={y.at(tick) + 4} textAnchor="end" fill="var(--ink2)">
            {printFixed(tick, yTicks.decimals)}
          </text>
        </g>
      ))}
    </g>
  );
}
