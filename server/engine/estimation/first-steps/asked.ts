import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { demographicColumn } from "../../columns/seasonal-terms.ts";
import { type FirstStage, firstStageOf } from "./first-stage.ts";
import { type Participation, participationOf } from "./participation.ts";

/** What is estimated before the share equations, and enters them as data. */
export interface FirstSteps {
  /** Instruments of ln x: its residual enters every equation. */
  readonly instruments?: readonly string[];
  /** Columns of the probits beside prices, ln x and demographics; present, if empty, where zeros take two steps. */
  readonly participation?: readonly string[];
}

type Asked = Pick<SystemSpecification, "instruments" | "zeros">;

/** The first steps of a specification; undefined where it has none. */
export function firstStepsOf({ instruments, zeros }: Asked): FirstSteps | undefined {
  if (instruments === undefined && zeros === undefined) return undefined;
  return {
    ...(instruments && { instruments }),
    ...(zeros && { participation: zeros === "two-step" ? [] : zeros["two-step"] }),
  };
}

/** The first stage of ln x that a specification asks for. Errors: see `firstStageOf`. */
export function askedFirstStage(
  data: PreparedData,
  instruments: readonly string[],
  names: readonly string[],
): FirstStage {
  return firstStageOf(data, { instruments, demographics: demographicsOf(data, names) });
}

/** The probits that a specification asks for. Errors: see `participationOf`. */
export function askedParticipation(
  data: PreparedData,
  columns: readonly string[],
  names: readonly string[],
): Participation {
  return participationOf(data, { columns, demographics: demographicsOf(data, names) });
}

function demographicsOf(data: PreparedData, names: readonly string[]) {
  return names.flatMap((label) => {
    const values = demographicColumn(data, label);
    return values === undefined ? [] : [{ label, values }];
  });
}
