import type { SystemFinding, SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import type { RunControl } from "../../run.ts";
import type { CoefficientName } from "../coefficient-labels.ts";
import type { Estimation } from "../estimation.ts";
import { estimateExactEasi } from "./exact.ts";
import { easiSizeOf } from "./specification.ts";

type Found = Omit<SystemFinding, "points" | "expenditureElasticities" | "engel" | "checks">;

/** What the estimator of linear equations has found out before it meets the exact form. */
export interface ExactAsked {
  readonly specification: SystemSpecification;
  readonly data: PreparedData;
  readonly size: SystemSize;
  readonly names: readonly CoefficientName[];
  /** Place of the good whose equation is dropped. */
  readonly dropped: number;
  readonly estimation: Estimation;
}

/** The finding of EASI with exact real expenditure but for its economics. Errors: see `estimateExactEasi`. */
export function exactFinding(asked: ExactAsked, control: RunControl): Found {
  const { specification, data, size, names, dropped, estimation } = asked;
  const { theta, covariance, ...found } = estimateExactEasi(specification, data, size, estimation, control);
  return {
    kind: "system",
    dataFingerprint: data.fingerprint,
    fitted: {
      form: "easi",
      easi: fittedEasi(specification),
      goods: [...data.goods],
      demographics: [...specification.demographics],
      alpha0: specification.alpha0,
      imposed: [...specification.impose],
      theta,
      covariance,
    },
    coefficients: names.map((name, a) => ({
      ...name,
      estimate: theta[a],
      standardError: Math.sqrt(covariance[a][a]),
    })),
    estimator: specification.estimator,
    dropped: data.goods[dropped],
    rows: data.rows,
    weighted: estimation.moments.weighted,
    freeCoefficients: estimation.form.free,
    ...found,
  };
}

/** Degree and interactions as a finding keeps them. */
export function fittedEasi(specification: SystemSpecification) {
  const { degree, interactions } = easiSizeOf(specification);
  return { degree, interactions: [...interactions] };
}
