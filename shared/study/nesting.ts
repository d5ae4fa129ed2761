import type { SystemFinding, SystemSpecification } from "../schemas/system.ts";
import { normaliseSpecification } from "./normalise.ts";
import { listWords } from "./words.ts";

/** One of two estimated systems that are set beside each other. */
export interface EstimatedSystem {
  readonly name: string;
  readonly specification: SystemSpecification;
  readonly finding: SystemFinding;
}

export type Nesting =
  /** The likelihood ratio tests what the smaller system leaves out or imposes, said as clauses. */
  | { readonly isNested: true; readonly smaller: "left" | "right"; readonly tests: readonly string[] }
  | { readonly isNested: false; readonly reason: string };

/**
 * Whether a likelihood ratio can be formed of two systems: truly nested, on the same rows of the same data, both at the
 * maximum of their likelihood and with conventional errors; else why not, the first reason that holds.
 */
export function nestingOf(left: EstimatedSystem, right: EstimatedSystem): Nesting {
  const reason = notComparable(left, right);
  if (reason !== undefined) return { isNested: false, reason };
  const [a, b] = [left, right].map(({ specification }) => normaliseSpecification(specification) as SystemSpecification);
  const apart = PARTS.flatMap((part) => part(a, b));
  const strange = apart.find((one): one is Apart & { unlike: string } => one.unlike !== undefined);
  if (strange) return { isNested: false, reason: strange.unlike };
  const [inLeft, inRight] = (["left", "right"] as const).map((side) => apart.filter(({ smaller }) => smaller === side));
  if (apart.length === 0) {
    return { isNested: false, reason: `${left.name} and ${right.name} are the same system: there is nothing to test` };
  }
  if (inLeft.length > 0 && inRight.length > 0) {
    const say = (side: EstimatedSystem, own: readonly Apart[]) => `${side.name} ${listWords(own.map(({ as }) => as))}`;
    return {
      isNested: false,
      reason: `neither is a special case of the other: ${say(left, inLeft)}, and ${say(right, inRight)}`,
    };
  }
  const smaller = inLeft.length > 0 ? "left" : "right";
  return { isNested: true, smaller, tests: apart.map(({ as }) => as) };
}

function notComparable(left: EstimatedSystem, right: EstimatedSystem): string | undefined {
  const [a, b] = [left.finding, right.finding];
  const both = [left, right];
  if (a.dataFingerprint !== b.dataFingerprint) return "they rest on different data";
  if (a.rows !== b.rows) return `${left.name} rests on ${a.rows} rows and ${right.name} on ${b.rows}`;
  const explains = both.map(({ finding }) => finding.equations?.explains ?? "shares");
  if (explains[0] !== explains[1]) return `${left.name} explains ${explains[0]} and ${right.name} ${explains[1]}`;
  const robust = both.find(({ finding }) => finding.standardErrors !== "conventional");
  if (robust) {
    return `${robust.name} asks for ${robust.finding.standardErrors} errors, and a likelihood ratio holds under conventional ones only; a tests cell has Wald’s`;
  }
  const short = both.find(({ finding }) => finding.aic === undefined);
  if (short) return `${short.name} is estimated by ${short.finding.estimator}, which does not maximise the likelihood`;
  const stepped = both.find(({ finding }) => finding.zeros !== undefined || finding.endogeneity !== undefined);
  if (stepped) return `${stepped.name} rests on a first step, whose own uncertainty the likelihood does not hold`;
  const curved = both.find(({ finding }) => finding.curvature !== undefined);
  if (curved) return `${curved.name} imposes negativity, and a ratio against that has no χ² distribution`;
  return undefined;
}

/** What parts two specifications: which is the smaller by it, and how that is said of it; or why neither can be. */
interface Apart {
  readonly smaller?: "left" | "right";
  readonly as: string;
  readonly unlike?: string;
}

type Part = (a: SystemSpecification, b: SystemSpecification) => Apart[];

const unlike = (reason: string): Apart[] => [{ as: "", unlike: reason }];

/** Forms of which one is the other with terms set to nought. */
const SPECIAL_CASES: readonly { readonly small: string; readonly large: string; readonly as: string }[] = [
  { small: "aids", large: "quaids", as: "has no quadratic terms" },
];

const form: Part = (a, b) => {
  if (a.form === b.form) return [];
  const found = SPECIAL_CASES.find(
    ({ small, large }) => [a.form, b.form].toSorted().join() === [small, large].toSorted().join(),
  );
  if (!found)
    return unlike(`${a.form} and ${b.form} are different forms, of which neither is a special case of the other`);
  return [{ smaller: a.form === found.small ? "left" : "right", as: found.as }];
};

/** Keys that must agree: the equations' own variables follow from them. */
const same =
  (key: keyof SystemSpecification, fallback?: unknown): Part =>
  (a, b) => {
    const [left, right] = [a[key] ?? fallback, b[key] ?? fallback];
    return left === right ? [] : unlike(`${key} differs: ${left ?? "none"} and ${right ?? "none"}`);
  };

/** Lists in which more is larger (demographics) or smaller (restrictions imposed). */
const listed =
  (key: "impose" | "demographics" | "interactions", more: "larger" | "smaller", say: (names: string) => string): Part =>
  (a, b) => {
    const [left, right] = [a[key] ?? [], b[key] ?? []] as readonly (readonly string[])[];
    const onlyIn = (one: readonly string[], other: readonly string[]) => one.filter((name) => !other.includes(name));
    const [leftOnly, rightOnly] = [onlyIn(left, right), onlyIn(right, left)];
    const apart = (names: readonly string[], owner: "left" | "right"): Apart[] => {
      if (names.length === 0) return [];
      const other = owner === "left" ? "right" : "left";
      return [{ smaller: more === "larger" ? other : owner, as: say(listWords([...names])) }];
    };
    return [...apart(leftOnly, "left"), ...apart(rightOnly, "right")];
  };

const degree: Part = (a, b) => {
  if (a.form !== "easi") return [];
  const [left, right] = [a.degree ?? 3, b.degree ?? 3];
  if (left === right) return [];
  return [{ smaller: left < right ? "left" : "right", as: `has Engel curves of degree ${Math.min(left, right)} only` }];
};

const trend: Part = (a, b) => {
  const [left, right] = [a.trend ?? false, b.trend ?? false];
  return left === right ? [] : [{ smaller: left ? "right" : "left", as: "has no trend" }];
};

const season: Part = (a, b) => {
  const [left, right] = [a.season, b.season];
  if (!left || !right) return left === right ? [] : [{ smaller: left ? "right" : "left", as: "has no season" }];
  if (left.period !== right.period) return unlike(`their seasons have ${left.period} and ${right.period} periods`);
  // A dummy for every period spans every pair of sine and cosine.
  const [pairs, others] = [left, right].map(({ harmonics }) => harmonics ?? Number.POSITIVE_INFINITY);
  if (pairs === others) return [];
  return [{ smaller: pairs < others ? "left" : "right", as: "has a smoother season" }];
};

const PARTS: readonly Part[] = [
  form,
  same("index"),
  same("alpha0"),
  same("differences", false),
  same("errors", "shares"),
  same("real expenditure", "exact"),
  listed("impose", "smaller", (names) => `imposes ${names}`),
  listed("demographics", "larger", (names) => `leaves out ${names}`),
  listed("interactions", "larger", (names) => `leaves out the interactions ${names}`),
  degree,
  trend,
  season,
];
