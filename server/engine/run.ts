import type { Progress } from "../../shared/schemas/status.ts";

/** How a long computation speaks while it runs, and how it is told to stop. */
export interface RunControl {
  progress(now: Omit<Progress, "elapsedMs" | "aboutMs">): void;
  /** True once someone has cancelled: the computation throws `Cancelled` at its next opportunity. */
  cancelled(): boolean;
}

/** Thrown by the engine when `cancelled()` turned true. */
export class Cancelled extends Error {
  override name = "Cancelled";
}

export const QUIET: RunControl = { progress() {}, cancelled: () => false };
