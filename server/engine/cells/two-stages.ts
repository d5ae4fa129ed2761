import { responsesAt } from "../../../shared/economics/responses.ts";
import type { Stage } from "../../../shared/economics/two-stage-errors.ts";
import type { ElasticitiesSpecification } from "../../../shared/schemas/elasticities.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital } from "../../../shared/study/words.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { notPositive } from "./elasticity-at.ts";
import { meanOver } from "./elasticity-points.ts";
import { refusingRanges } from "./refusing.ts";
import { pointOf } from "./slutsky-point.ts";

/** A system as estimated, with the rows it rests on. */
export interface EstimatedSystem {
  readonly finding: SystemFinding;
  readonly data: PreparedData;
}

type Asked = Pick<ElasticitiesSpecification, "at" | "shares" | "index">;

/**
 * One of two systems at the point a cell asks for: what its elasticities are formed from, and its total there in the
 * units uploaded. Weights of Stone's index move where that is asked and the system has them.
 * Errors: `Refusal` under `key` (a share that is not positive, a system that is not defined there).
 */
export function stageAt(
  { at = "mean", shares: asked, index }: Asked,
  { finding, data }: EstimatedSystem,
  key: "system" | "within",
): Stage & { readonly pointName: string; readonly total: number } {
  const { fitted } = finding;
  const { point, pointName } = pointOf(at, finding, data);
  const shares = SYSTEMS[fitted.form].kind === "differences" ? "observed" : asked;
  const row = typeof at === "object" && "row" in at ? Int32Array.of(data.rowNumbers.indexOf(at.row)) : undefined;
  const observed = shares === "observed" && data.shares.map((column) => meanOver(column, row, data.weights));
  const { responses, gradients } = refusingRanges(
    () =>
      responsesAt(fitted, point, {
        index: fitted.index === "stone" ? index : "held",
        ...(observed && { observed }),
      }),
    pointName,
  );
  const reason = notPositive(responses.shares, fitted.goods, shares);
  if (reason !== undefined) {
    const which = key === "within" ? ", in the broader system" : "";
    throw new Refusal([{ sentence: `${capital(`at ${withArticle(pointName)}`)}${which}: ${reason}`, key: [key] }]);
  }
  return { responses, gradients, covariance: fitted.covariance, pointName, total: point.total * data.totalScale };
}
