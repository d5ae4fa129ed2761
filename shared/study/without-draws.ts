import type { SystemFinding } from "../schemas/system.ts";

/**
 * A system finding as it leaves the program: without the bootstrap's draws, which are many numbers and serve cells
 * that derive something from the coefficients. Covariance and intervals of the coefficients stay.
 */
export function withoutDraws(finding: SystemFinding): SystemFinding {
  if (finding.bootstrap === undefined) return finding;
  const { draws: _, ...bootstrap } = finding.bootstrap;
  return { ...finding, bootstrap };
}
