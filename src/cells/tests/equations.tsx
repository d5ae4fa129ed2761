import { useId } from "react";
import type { TestsFinding } from "../../../shared/schemas/tests.ts";
import { capital } from "../../../shared/study/words.ts";
import { equationsOf, equationTestsTable } from "../../../shared/tables/equation-tests.ts";
import { DECIMALS, printFixed, printProbability, printQuantity } from "../../../shared/tables/numbers.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { Estimate } from "../../components/number.tsx";
import { Table } from "../../components/table.tsx";
import { CopyTable } from "../copy-table.tsx";

/** Homogeneity equation by equation: where a rejection comes from. */
export function Equations({ finding }: { finding: TestsFinding }) {
  const id = useId();
  const equations = equationsOf(finding);
  if (equations.length === 0) return null;
  const table = equationTestsTable(finding);
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-6">
        <h2 id={id} className="type-section">
          Homogeneity, equation by equation
        </h2>
        <CopyTable table={table} />
      </div>
      <Table
        caption={table.title}
        className="max-w-[34rem]"
        heads={[
          { key: "good", content: table.corner },
          ...table.columns.map(({ label }) => ({ key: label, content: label })),
        ]}
        lines={equations.map(({ good, sum, standardError, t, pValue }) => ({
          key: good,
          head: (
            <>
              {capital(good)}
              <AnchorMark of={`row ${capital(good)}, homogeneity`} />
            </>
          ),
          cells: [
            <Estimate
              key="sum"
              value={printFixed(sum, DECIMALS.coefficient)}
              error={printFixed(standardError, DECIMALS.coefficient)}
            />,
            printQuantity(t, "fit"),
            printProbability(pValue),
          ],
        }))}
      />
      <p className="type-small mt-2 text-ink2">{table.notes.join(" ")}</p>
    </section>
  );
}
