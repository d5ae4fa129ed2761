interface Asked {
  readonly form: string;
  readonly degree?: number;
  readonly interactions?: readonly string[];
  readonly "real expenditure"?: string;
  readonly demographics: readonly string[];
  readonly season?: unknown;
  readonly trend?: boolean;
}

/** Keys that belong to easi only, and interactions with demographics where there are none. */
export function easiIssues(asked: Asked): { path: string[]; message: string }[] {
  const { form, interactions = [], demographics, season, trend } = asked;
  const issues: { path: string[]; message: string }[] = [];
  if (form !== "easi") {
    for (const key of ["degree", "interactions", "real expenditure"] as const) {
      if (asked[key] === undefined) continue;
      issues.push({ path: [key], message: `${key} belongs to easi; ${form} has none to choose` });
    }
    return issues;
  }
  const without = demographics.length === 0 && season === undefined && !trend;
  const needing = interactions.find((name) => name.endsWith("with demographics"));
  if (without && needing !== undefined) {
    issues.push({ path: ["interactions"], message: `${needing} needs demographics: name at least one` });
  }
  return issues;
}
