import type { ReactNode } from "react";
import type { OneEstimate } from "../../../shared/tables/elasticities.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";
import { Estimate, Printed } from "../../components/number.tsx";
import { SwitchWords } from "../../components/switch-words.tsx";

/** What stands under an estimate. */
export type Below = "errors" | "intervals";

const print = (value: number) => printFixed(value, DECIMALS.elasticity);

interface EstimateProps {
  readonly one: OneEstimate;
  readonly below: Below;
  /** What stands before the number: the sign of a pair. */
  readonly mark?: ReactNode;
}

/** An elasticity over its standard error, or over its interval. */
export function ElasticityEstimate({ one, below, mark }: EstimateProps) {
  if (below === "errors") {
    return (
      <>
        {mark}
        <Estimate value={print(one.value)} error={print(one.error)} />
      </>
    );
  }
  return (
    <span className="inline-block text-right tabular-nums">
      <span className="block">
        {mark}
        <Printed text={print(one.value)} />
      </span>
      <span className="type-smallest block whitespace-nowrap text-ink2">
        {print(one.low)} to {print(one.high)}
      </span>
    </span>
  );
}

export function BelowSwitch({ below, onChange }: { below: Below; onChange: (below: Below) => void }) {
  return (
    <SwitchWords
      label="Under each estimate"
      value={below}
      onChange={onChange}
      words={[
        { value: "errors", word: "Standard errors" },
        { value: "intervals", word: "Intervals" },
      ]}
    />
  );
}
