import type { Drawn, FigureFinding, FigureSpecification } from "../../../shared/schemas/figure.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import type { RunControl } from "../run.ts";

/** What is drawn, and how its intervals came about. */
export interface DrawnWith {
  readonly drawn: Drawn;
  readonly intervals: FigureFinding["intervals"];
  readonly standardErrors?: string;
  readonly pointName?: string;
}

/** What figures of a system are drawn from; `goods` are places among the system's. */
export interface AskedOfSystem {
  readonly specification: FigureSpecification;
  readonly goods: readonly number[];
  readonly system: SystemFinding;
  readonly data: PreparedData;
  readonly control: RunControl;
}
