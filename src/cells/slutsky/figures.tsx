import type { SlutskyFinding } from "../../../shared/schemas/slutsky.ts";
import { DECIMALS, printFixed, printPercent, THIN_SPACE } from "../../../shared/tables/numbers.ts";
import { intervalInWords } from "../../../shared/tables/phrases.ts";
import { EigenvalueAxis } from "./eigenvalue-axis.tsx";
import { NegativityHistogram } from "./negativity-histogram.tsx";
import { axisFloor, Tenths } from "./tenths.tsx";

const print = (value: number) => printFixed(value, DECIMALS.entry);

/** What the largest eigenvalue says, in a sentence. */
function largestInWords({ eigenvalues, checks }: SlutskyFinding["at"]): string {
  const [largest] = eigenvalues;
  const isClear = largest.interval ? largest.interval[1] < 0 : largest.value < -2 * largest.standardError;
  const room = isClear ? "Negativity holds with room to spare" : "Negativity holds";
  const ends = largest.interval ? `, ${intervalInWords(largest.interval, DECIMALS.entry)}` : "";
  const verdict = checks.negativity.holds ? room : "Negativity breaks";
  return `Share form, symmetrised, with 95${THIN_SPACE}% ${largest.interval ? "percentile intervals of the bootstrap" : "intervals"}. The largest is ${print(largest.value)} (${print(largest.standardError)})${ends}: ${largest.direction}. ${verdict}.`;
}

export function Eigenvalues({ finding }: { finding: Pick<SlutskyFinding, "at"> }) {
  const { eigenvalues } = finding.at;
  return (
    <section aria-labelledby="eigenvalues" className="border-line border-t pt-4">
      <h2 id="eigenvalues" className="type-section">
        Eigenvalues
      </h2>
      {eigenvalues.length === 0 ? (
        <p className="type-small max-w-[38rem] text-ink2">
          Not stated: without homogeneity the symmetrised matrix is indefinite by construction, whatever the data.
        </p>
      ) : (
        <>
          <p className="type-small text-ink2">{largestInWords(finding.at)}</p>
          <div className="mt-3">
            <EigenvalueAxis eigenvalues={eigenvalues} />
          </div>
        </>
      )}
    </section>
  );
}

/** Negativity at every row's own prices and expenditure, and by tenth of expenditure. */
export function NegativityOverSample({ finding }: { finding: Pick<SlutskyFinding, "at" | "sample" | "brokenRows"> }) {
  const { sample, brokenRows, at } = finding;
  const negativity = at.checks.sample?.negativity;
  if (!sample || !negativity) return null;
  return (
    <div className="grid gap-x-14 gap-y-6 border-line border-t pt-4 min-[1100px]:grid-cols-2">
      <section aria-labelledby="negativity">
        <h2 id="negativity" className="type-section">
          Negativity over the sample
        </h2>
        <p className="type-small mb-3 text-ink2">
          Largest eigenvalue at each row’s own prices and expenditure, shares of rows by weight
        </p>
        <NegativityHistogram sample={sample} brokenRows={brokenRows} holds={negativity.weightedShareThatHolds} />
      </section>
      <section aria-labelledby="tenths">
        <h2 id="tenths" className="type-section">
          By tenth of expenditure
        </h2>
        <p className="type-small mb-3 text-ink2">
          Share of rows where negativity holds; the axis begins at {printPercent(axisFloor(sample.byTenth), 0)}
        </p>
        <Tenths byTenth={sample.byTenth} />
      </section>
    </div>
  );
}
