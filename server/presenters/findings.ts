import type { Finding } from "../../shared/schemas/cell.ts";
import { withoutDraws } from "../../shared/study/without-draws.ts";
import type { StoredFinding } from "../services/ports.ts";

/** A finding is its kind's schema already, sent without a bootstrap's draws; here it gets when it was found and how long that took. */
export function presentFinding({ finding, foundAt, tookMs }: StoredFinding): {
  finding: Finding;
  foundAt: string;
  tookMs: number;
} {
  return {
    finding: finding.kind === "system" ? withoutDraws(finding) : finding,
    foundAt: new Date(foundAt).toISOString(),
    tookMs,
  };
}
