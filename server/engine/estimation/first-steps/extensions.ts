import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { DemandSystem } from "../../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { askedParticipation, firstStepsOf } from "./asked.ts";
import { type Extension, extendedSystem } from "./extended-system.ts";
import type { Participation } from "./participation.ts";

/** The block of the coefficients of the first stage's residual, and of the densities of the probits. */
const RESIDUAL_BLOCK = "residual";
const DENSITY_BLOCK = "density";

/** w_i = C_i(θ) Z + ρ_i v̂ + e_i, Σ ρ_i = 0: the residual is one more term of every equation. */
function withResidual(goods: number): Extension {
  return {
    block: { name: RESIDUAL_BLOCK, symbol: "ρ" },
    goods: Array.from({ length: goods }, (_, good) => good),
    sumToZero: true,
    width: (terms) => terms + 1,
    place: (_, term) => term,
    extra: (_, terms) => terms,
  };
}

/**
 * w_i = Φ̂_i C_i(θ) Z + δ_i φ̂_i + e_i, Shonkwiler & Yen's second step for all n goods. Observed shares add up to one and
 * the predicted ones need not, so that Σ_i e_i is no error but a function of the regressors: weighed like one, its small
 * variance would pass for precision, and the likelihood would grow without bound as it is driven to zero. What is weighed
 * is therefore e less its mean over goods, from which no good is left out and on which the choice of one would not
 * tell. The terms are those of the system, where some good is bought by all, else the
 * constant alone; then for each good with zeros Φ̂_i Z; then the φ̂_i.
 */
export function withParticipation({ goods }: Participation): Extension {
  const { sometimes, always } = kindsOf(goods);
  const first = (terms: number) => (always ? terms : 1);
  return {
    block: { name: DENSITY_BLOCK, symbol: "δ" },
    goods: sometimes,
    sumToZero: false,
    centred: true,
    width: (terms) => first(terms) + sometimes.length * (terms + 1),
    place: (good, term, terms) => {
      const among = sometimes.indexOf(good);
      return among < 0 ? term : first(terms) + among * terms + term;
    },
    extra: (a, terms) => first(terms) + sometimes.length * terms + a,
  };
}

/** The goods that some rows do not buy, and whether there are others. */
export function kindsOf(goods: Participation["goods"]): { sometimes: number[]; always: boolean } {
  const sometimes = goods.flatMap(({ step }, good) => (step ? [good] : []));
  return { sometimes, always: sometimes.length < goods.length };
}

/** The system with what the first steps of a specification add to its equations; itself where there are none. */
export function withFirstSteps(
  system: DemandSystem,
  specification: SystemSpecification,
  data: PreparedData,
): DemandSystem {
  const steps = firstStepsOf(specification);
  if (steps === undefined) return system;
  const { instruments, participation } = steps;
  let extended = system;
  if (instruments) extended = extendedSystem(extended, withResidual(data.goods.length));
  if (participation) {
    const found = askedParticipation(data, participation, specification.demographics);
    extended = extendedSystem(extended, withParticipation(found));
  }
  return extended;
}
