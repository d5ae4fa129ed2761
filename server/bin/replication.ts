import type { BundleManifest } from "../../shared/schemas/replication-bundle.ts";
import type { ComparedFinding } from "../bundle/compare-findings.ts";
import type { Complaint } from "./estimate-study.ts";

/** A file of the data, as the bundle names it and as it was found. */
export interface ReplicatedData {
  readonly file: string;
  readonly standing: "in the bundle" | "given" | "absent";
  /** SHA-256 of the file that was read; absent where there is none. */
  readonly sha256?: string;
  /** Absent where the bundle knows the fingerprint of the prepared data alone, which its findings hold. */
  readonly expected?: string;
}

export interface ReplicatedCell {
  readonly name: string;
  readonly kind: string;
  /** What the comparison rests on; absent where there is none. */
  readonly from?: "data" | "moments" | "coefficients";
  /** Why there is no comparison, or what it leaves out. */
  readonly because?: string;
  readonly compared?: ComparedFinding;
}

export interface Replication {
  readonly bundle: Pick<BundleManifest, "study" | "program" | "madeAt" | "leftOut">;
  readonly data: readonly ReplicatedData[];
  readonly cells: readonly ReplicatedCell[];
  /** What the program refuses of the study now. */
  readonly complaints: readonly Complaint[];
}
