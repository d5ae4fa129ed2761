import { useId } from "react";
import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { capital } from "../../../shared/study/words.ts";
import { digitsForAll, printFixed } from "../../../shared/tables/numbers.ts";
import { EFFECT_NAMES, type EffectName } from "../../../shared/tables/price-change.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { Hatch } from "../../components/chart-hatch.tsx";
import { Estimate } from "../../components/number.tsx";
import { SwitchWords } from "../../components/switch-words.tsx";
import { TableScroller } from "../../components/table-scroller.tsx";
import { EffectBarsOf, type EffectParts, reachOfBars } from "./effect-bars.tsx";

const WORDS: Readonly<Record<EffectName, string>> = {
  hicks: "Hicks",
  slutsky: "Slutsky",
  infinitesimal: "Small changes",
};

const SAYS: Readonly<Record<EffectName, string>> = {
  hicks: "Exact finite changes: substitution at the old standard of living, then the loss of income.",
  slutsky: "Exact finite changes: substitution while the old bundle stays affordable, then the loss of income.",
  infinitesimal: "By the slopes before the change: near it for small changes, further off for large ones.",
};

/** Which compensation parts the two effects; only those that the system has. */
export function EffectSwitch({
  finding,
  which,
  onChange,
}: {
  finding: PriceChangeFinding;
  which: EffectName;
  onChange: (which: EffectName) => void;
}) {
  const offered = EFFECT_NAMES.filter((name) => finding.at[name] !== undefined);
  return (
    <SwitchWords
      label="Compensation"
      value={which}
      onChange={onChange}
      words={offered.map((value) => ({ value, word: WORDS[value] }))}
    />
  );
}

const HEAD = "pb-1.5 align-bottom type-small font-normal text-ink2";

/** What is bought before, and the two parts of the change, good by good; estimates over standard errors. */
export function EffectsView({ finding, which }: { finding: PriceChangeFinding; which: EffectName }) {
  const hatch = useId();
  const { at, fitted } = finding;
  const effects = at[which];
  if (effects === undefined) return null;
  const before = at.quantities.before.values;
  const { decimals } = digitsForAll(before);
  const print = (value: number) => printFixed(value, decimals);
  const parts = fitted.goods.map((_, i): EffectParts => {
    const [substitution, income] = [effects.substitution.values[i] / before[i], effects.income.values[i] / before[i]];
    return { substitution, income, both: substitution + income };
  });
  const reach = reachOfBars(parts);
  const total = which === "infinitesimal" ? undefined : at.total;
  return (
    <>
      <p className="type-small mb-2 text-ink2">{SAYS[which]} Quantities in the units uploaded.</p>
      <TableScroller label="What is bought, and how it changes">
        <table className="type-table w-full border-line border-b">
          <caption className="sr-only">What is bought, and how it changes</caption>
          <thead>
            <tr className="border-line border-b">
              <th scope="col" className={`sticky left-0 bg-recto pr-3 text-left ${HEAD}`}>
                Good
              </th>
              {["Before", "", "Substitution", "Income", ...(total ? ["Both"] : [])].map((head) =>
                head === "" ? (
                  <td key="bars" className="pb-1.5 max-[599px]:hidden" />
                ) : (
                  <th key={head} scope="col" className={`pr-[0.33em] pl-3 text-right ${HEAD}`}>
                    {head}
                  </th>
                ),
              )}
            </tr>
          </thead>
          <tbody>
            {fitted.goods.map((good, i) => (
              <tr key={good}>
                <th scope="row" className="sticky left-0 bg-recto py-1 pr-3 text-left align-top font-normal">
                  {capital(good)}
                  <AnchorMark of={`row ${capital(good)}`} />
                </th>
                <td className="py-1 pr-[0.33em] pl-3 text-right align-top">{print(before[i])}</td>
                <td className="px-1 py-1 align-top max-[599px]:hidden">
                  <EffectBarsOf parts={parts[i]} reach={reach} hatch={hatch} />
                </td>
                {[effects.substitution, effects.income, ...(total ? [total] : [])].map((own, column) => (
                  <td
                    key={column}
                    className={`whitespace-nowrap py-1 pr-[0.33em] pl-3 text-right align-top ${column === 2 ? "font-semibold" : ""}`}
                  >
                    <Estimate value={print(own.values[i])} error={print(own.errors[i])} />
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </TableScroller>
      <BarWords hatch={hatch} />
    </>
  );
}

function BarWords({ hatch }: { hatch: string }) {
  const box = "inline-block align-[-1px]";
  return (
    <p className="type-small mt-2 flex flex-wrap gap-x-5 text-ink2 max-[599px]:hidden">
      <span>
        <svg aria-hidden="true" width="20" height="8" className={box}>
          <defs>
            <Hatch id={hatch} colour="var(--p4)" />
          </defs>
          <rect width="20" height="8" fill="var(--n4)" />
        </svg>{" "}
        substitution
      </span>
      <span>
        <svg aria-hidden="true" width="20" height="8" className={box}>
          <rect x="0.5" y="0.5" width="19" height="7" fill={`url(#${hatch})`} stroke="var(--p4)" />
        </svg>{" "}
        income
      </span>
      <span>
        <svg aria-hidden="true" width="8" height="8" className={box}>
          <rect width="7" height="7" y="0.5" fill="var(--ink)" />
        </svg>{" "}
        both; bars in per cent of before
      </span>
    </p>
  );
}
