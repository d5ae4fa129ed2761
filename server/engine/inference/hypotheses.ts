import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { HypothesisName, UnmadeTest } from "../../../shared/schemas/tests.ts";
import type { BlockColumns, DemandSystem, FreeForm, SystemSize } from "../../../shared/systems/demand-system.ts";
import type { RestrictionName } from "../../../shared/systems/names.ts";
import { withoutCoefficients } from "./nested-form.ts";

/** A restriction to test: the model without it, and with it. */
export interface Hypothesis {
  readonly hypothesis: HypothesisName;
  /** The demographic tested alone. */
  readonly column?: string;
  /** What holds in both models. */
  readonly given: readonly RestrictionName[];
  readonly wide: FreeForm;
  readonly narrow: FreeForm;
}

export interface Asked {
  readonly system: DemandSystem;
  readonly size: SystemSize;
  /** With its terms of time among the demographics. */
  readonly specification: Pick<SystemSpecification, "impose" | "demographics">;
}

/**
 * The hypotheses of a system, or why there is nothing to test. Those of theory are taken from the least restricted
 * system, whatever the specification imposes; those of its own terms from the system as it is specified.
 */
export function hypothesesOf(names: readonly HypothesisName[], asked: Asked): (Hypothesis | UnmadeTest)[] {
  const forms = new Map<string, FreeForm>();
  const under = (...impose: RestrictionName[]): FreeForm => {
    const key = impose.join();
    const known = forms.get(key) ?? asked.system.free(asked.size, impose);
    forms.set(key, known);
    return known;
  };
  const find: Readonly<Partial<Record<HypothesisName, () => (Hypothesis | UnmadeTest)[]>>> = {
    homogeneity: () => [theory(asked, "homogeneity", [], under(), under("homogeneity"))],
    symmetry: () => [symmetry(asked, under("homogeneity"), under("homogeneity", "symmetry"))],
    "homogeneity and symmetry": () => [
      theory(asked, "homogeneity and symmetry", [], under(), under("homogeneity", "symmetry")),
    ],
    demographics: () => demographicTests(asked, under(...maintained(asked))),
    "quadratic terms": () => [blockTest(asked, "quadratic terms", "lambda", under(...maintained(asked)))],
    exogeneity: () => [blockTest(asked, "exogeneity", "residual", under(...maintained(asked)))],
  };
  return names.flatMap((name) => find[name]?.() ?? []);
}

const nothing = (hypothesis: HypothesisName, reason: string): UnmadeTest => ({
  hypothesis,
  because: "nothing to test",
  reason,
});

function theory(
  { system }: Asked,
  hypothesis: HypothesisName,
  given: readonly RestrictionName[],
  wide: FreeForm,
  narrow: FreeForm,
): Hypothesis | UnmadeTest {
  if (system.heldByForm.length > 0 && wide.places.length === narrow.places.length) {
    const reason = `Of the ${system.longName} it holds by the form itself, whatever the coefficients.`;
    return { hypothesis, because: "by form", reason };
  }
  return { hypothesis, given, wide, narrow };
}

function symmetry(asked: Asked, wide: FreeForm, narrow: FreeForm): Hypothesis | UnmadeTest {
  const test = theory(asked, "symmetry", ["homogeneity"], wide, narrow);
  if ("because" in test || wide.places.length > narrow.places.length) return test;
  return nothing("symmetry", "Between two goods symmetry follows from adding-up and homogeneity.");
}

/** What the specification imposes; symmetry brings homogeneity with it. */
function maintained({ system, specification: { impose } }: Asked): RestrictionName[] {
  const held = new Set([...system.heldByForm, ...impose]);
  return (["homogeneity", "symmetry"] as const).filter((name) => held.has(name));
}

/** Seasonal terms are one thing, however many; a trend is another. */
const SEASON = /^season .* of \d+$/;
const groupOf = (name: string): string => (SEASON.test(name) ? "season" : name);

function demographicTests(asked: Asked, wide: FreeForm): (Hypothesis | UnmadeTest)[] {
  const { system, size } = asked;
  const groups = asked.specification.demographics.map(groupOf);
  if (groups.length === 0) {
    const why = system.takesDemographics ? "as specified names no demographics" : "takes no demographics";
    return [nothing("demographics", `The ${system.longName} ${why}.`)];
  }
  const columnsOf = new Map(system.blocks.map(({ name, columns }) => [name, columns]));
  const layout = system.layout(size);
  const test = (isTested: (group: string) => boolean): Pick<Hypothesis, "hypothesis" | "given" | "wide" | "narrow"> => {
    const zero = layout.flatMap(({ block, column = 0 }, a) => {
      const demographic = demographicOf(columnsOf.get(block)!, column, size.goods);
      return demographic !== undefined && isTested(groups[demographic]) ? [a] : [];
    });
    const narrow = withoutCoefficients(wide, new Set(zero));
    return { hypothesis: "demographics", given: maintained(asked), wide, narrow };
  };
  const each = [...new Set(groups)];
  const together = each.length > 1 ? [test(() => true)] : [];
  return [...together, ...each.map((column) => ({ ...test((group) => group === column), column }))];
}

/** Which demographic a column of a block belongs to, alone or times something else. */
function demographicOf(columns: BlockColumns, column: number, goods: number): number | undefined {
  if (columns === "demographics" || columns === "demographics by expenditure") return column;
  return columns === "goods by demographics" ? Math.floor(column / goods) : undefined;
}

const ABSENT = {
  "quadratic terms": "has no quadratic terms",
  exogeneity: "names no instruments, so that nothing can tell whether its total expenditure is exogenous",
} as const;

function absence({ system, size }: Asked, hypothesis: keyof typeof ABSENT): string {
  const degree = hypothesis === "quadratic terms" ? (size.easi?.degree ?? 1) : 1;
  return degree > 1
    ? `Quadratic terms are those of the quadratic almost ideal system; powers of real expenditure up to ${degree} in the ${system.longName} are not tested here.`
    : `The ${system.longName} as specified ${ABSENT[hypothesis]}.`;
}

/** Whether a block of coefficients is nought. */
function blockTest(
  asked: Asked,
  hypothesis: "quadratic terms" | "exogeneity",
  block: string,
  wide: FreeForm,
): Hypothesis | UnmadeTest {
  const layout = asked.system.layout(asked.size);
  const zero = new Set(layout.flatMap((place, a) => (place.block === block ? [a] : [])));
  if (zero.size === 0) return nothing(hypothesis, absence(asked, hypothesis));
  return { hypothesis, given: maintained(asked), wide, narrow: withoutCoefficients(wide, zero) };
}
