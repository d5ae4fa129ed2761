import { useId } from "react";
import type { Endogeneity } from "../../../shared/schemas/first-steps.ts";
import { firstStageTable } from "../../../shared/tables/first-steps.ts";
import { endogeneitySentences } from "../../../shared/tables/first-steps-words.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";
import { Estimate } from "../../components/number.tsx";
import { Table } from "../../components/table.tsx";
import { CopyTable } from "../copy-table.tsx";

const coefficient = (value: number) => printFixed(value, DECIMALS.coefficient);

function Coefficient({ estimate, standardError }: { estimate: number; standardError: number }) {
  return <Estimate value={coefficient(estimate)} error={coefficient(standardError)} />;
}

/** The first stage of total expenditure, its residual in the share equations, and the test of exogeneity. */
export function EndogeneityView({ endogeneity }: { endogeneity: Endogeneity }) {
  const id = useId();
  const { firstStage, instruments, residual } = endogeneity;
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-6">
        <h2 id={id} className="type-section">
          Endogenous total expenditure
        </h2>
        <CopyTable table={firstStageTable(endogeneity)} />
      </div>
      <div className="grid gap-x-14 gap-y-6 min-[1100px]:grid-cols-2">
        <Table
          caption="First stage: ln total expenditure on instruments, prices and demographics"
          heads={[
            { key: "regressor", content: "First stage" },
            { key: "estimate", content: "ln total expenditure" },
          ]}
          lines={firstStage.coefficients.map((one) => ({
            key: one.name,
            head: instruments.includes(one.name) ? `${one.name}, instrument` : one.name,
            cells: [<Coefficient key="estimate" {...one} />],
          }))}
        />
        <Table
          caption="Coefficients of the residual of the first stage in the share equations"
          heads={[
            { key: "good", content: "Share equation" },
            { key: "rho", content: "Residual, ρ" },
          ]}
          lines={residual.map((one) => ({
            key: one.good,
            head: one.good,
            cells: [<Coefficient key="rho" {...one} />],
          }))}
        />
      </div>
      <p className="type-small mt-2 text-ink2">{endogeneitySentences(endogeneity).join(" ")}</p>
    </section>
  );
}
