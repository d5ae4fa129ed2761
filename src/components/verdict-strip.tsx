import { AnchorMark } from "./anchor-mark.tsx";
import { Printed } from "./number.tsx";
import { VerdictFigure, type VerdictShape } from "./verdict-figure.tsx";

export interface StripVerdict {
  /** The law: "Adding-up". */
  readonly law: string;
  readonly shape: VerdictShape;
  /** "holds", "imposed", "at base point", "breaks", "not stated". */
  readonly word: string;
  /** The number, or the reason, below the word. */
  readonly below: string;
}

/** Five columns on a wide page, three and two on a narrower one, rows on a phone. */
const ITEM = [
  "grid grid-cols-[1fr_auto] items-center gap-x-3 border-rule py-2.5 not-last:border-b",
  "min-[600px]:block min-[600px]:border-rule2 min-[600px]:border-b min-[600px]:py-1.5 min-[600px]:pl-3",
  "min-[600px]:max-[1023px]:nth-[3n+1]:pl-0 min-[600px]:max-[1023px]:not-nth-[3n+1]:border-l-rule",
  "min-[600px]:max-[1023px]:not-nth-[3n+1]:border-l",
  "min-[1024px]:first:pl-0 min-[1024px]:not-first:border-l min-[1024px]:not-first:border-l-rule",
].join(" ");

function Item({ verdict }: { verdict: StripVerdict }) {
  return (
    <li className={ITEM}>
      <div className="type-small text-ink2">{verdict.law}</div>
      <div className="row-span-2 flex items-center gap-2 text-[0.90625rem]/[1.3125rem] font-semibold">
        <VerdictFigure shape={verdict.shape} />
        {verdict.word}
      </div>
      <div className="type-smallest pr-1 text-ink2">
        <Printed text={verdict.below} />
        <AnchorMark of={`verdict ${verdict.law}`} />
      </div>
    </li>
  );
}

/** What theory says of a finding, in the same order everywhere: each law with a figure, a word and a number. */
export function VerdictStrip({ label, verdicts }: { label: string; verdicts: readonly StripVerdict[] }) {
  return (
    <ul
      aria-label={label}
      className="border-line border-t min-[600px]:grid min-[600px]:grid-cols-3 min-[1024px]:grid-cols-5"
    >
      {verdicts.map((verdict) => (
        <Item key={verdict.law} verdict={verdict} />
      ))}
    </ul>
  );
}
