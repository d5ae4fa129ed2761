import type { SealedContent } from "../../../shared/schemas/referee-copy.ts";
import { listWords } from "../../../shared/study/words.ts";
import { printCount } from "../../../shared/tables/numbers.ts";
import { slutskyVerdicts } from "../../../shared/tables/verdicts.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { stripOf } from "../verdicts.ts";

type SealedSlutsky = SealedContent["slutsky"];

/** "48 rows, 44 of them in the richest tenth of expenditure, most often through grains and meat & fish." */
function whereItBreaks({ breaks, breaksInRichestTenth, goods }: NonNullable<SealedSlutsky["sample"]>): string {
  const rows = breaks === 1 ? "1 row" : `${printCount(breaks)} rows`;
  const rich =
    breaksInRichestTenth > 0 ? `, ${printCount(breaksInRichestTenth)} of them in the richest tenth of expenditure` : "";
  const through = goods.length > 0 ? `, most often through ${listWords(goods.slice(0, 2))}` : "";
  return `${rows}${rich}${through}.`;
}

/** What theory says of a sealed matrix, and in how many rows negativity breaks; never which rows. */
export function SealedVerdicts({ finding }: { finding: SealedSlutsky }) {
  const { sample } = finding;
  return (
    <div>
      <VerdictStrip label="What theory says of the matrix" verdicts={stripOf(slutskyVerdicts(finding))} />
      {sample && sample.breaks > 0 && (
        <p className="mt-3 text-[0.875rem]/[1.25rem]">
          <strong>Where negativity breaks:</strong> {whereItBreaks(sample)}
        </p>
      )}
    </div>
  );
}
