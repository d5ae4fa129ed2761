import { useEffect, useState } from "react";
import type { Elasticities } from "../../../shared/economics/elasticities.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { createEconomicsWorker } from "../../workers/client.ts";

/** Where a system's own checks stand: its base point, or of data not normalised the mean. */
export const ownPoint = ({ checks, points }: SystemFinding) =>
  checks.pointName === "mean" ? points.mean : points.base;

export type BothElasticities =
  | { readonly state: "computing" }
  | { readonly state: "done"; readonly left: Elasticities; readonly right: Elasticities }
  | { readonly state: "failed"; readonly reason: string };

/** The elasticities of two systems, each at the point of its own checks, computed off the page's thread. */
export function useElasticities(left: SystemFinding, right: SystemFinding): BothElasticities {
  const [found, setFound] = useState<BothElasticities>({ state: "computing" });
  useEffect(() => {
    const worker = createEconomicsWorker();
    let isOpen = true;
    setFound({ state: "computing" });
    const ask = (finding: SystemFinding) =>
      worker.ask("elasticities", { fitted: finding.fitted, point: ownPoint(finding) });
    Promise.all([ask(left), ask(right)]).then(
      ([one, other]) => isOpen && setFound({ state: "done", left: one, right: other }),
      (error) =>
        isOpen && setFound({ state: "failed", reason: error instanceof Error ? error.message : String(error) }),
    );
    return () => {
      isOpen = false;
      worker.close();
    };
  }, [left, right]);
  return found;
}
