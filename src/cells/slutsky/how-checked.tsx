import type { SlutskyFinding } from "../../../shared/schemas/slutsky.ts";
import { printSize } from "../../../shared/tables/numbers.ts";
import { Printed } from "../../components/number.tsx";

const CHECKS = [
  ["Adding-up", "Columns sum to zero: the shares move, their sum does not."],
  ["Homogeneity", "Rows sum to zero: all prices up alike change nothing once compensated."],
  ["Symmetry", "Each entry equals its mirror."],
  ["Negativity", "No eigenvalue is positive, the direction of all prices set aside."],
  ["Monotonicity", "Predicted shares lie between 0 and 1."],
] as const;

/** How each check is made: stands on the source page of the opened cell. */
export function HowChecked({ finding }: { finding: SlutskyFinding }) {
  return (
    <section className="border-rule2 border-t pt-3" aria-labelledby="how-checked">
      <h2 id="how-checked" className="mb-2 type-small text-ink2">
        How each check is made
      </h2>
      {CHECKS.map(([law, says]) => (
        <p key={law} className="mb-2 font-serif text-[0.9375rem]/[1.375rem]">
          <i>{law}.</i> {says}
        </p>
      ))}
      <p className="type-small text-ink2">
        Tolerance <Printed text={printSize(finding.at.checks.tolerance)} />.
      </p>
    </section>
  );
}
