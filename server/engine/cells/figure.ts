import { type FigureFinding, type FigureSpecification, figureFinding } from "../../../shared/schemas/figure.ts";
import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { listSome } from "../../../shared/study/words.ts";
import { standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { QUIET, type RunControl } from "../run.ts";
import { caveatsOf } from "./caveats-of.ts";
import type { DrawnWith } from "./figure-asked.ts";
import { priceDistribution, sharesByGroup } from "./figure-data.ts";
import { elasticitiesDrawn } from "./figure-elasticities.ts";
import { fitOfShares } from "./figure-fit.ts";
import { incidenceDrawn } from "./figure-incidence.ts";
import { demandDrawn, eigenvalueDrawn, engelDrawn } from "./figure-system.ts";

/** The finding of the cell a figure is drawn of, where that is not the data itself. */
export type FigureBasis = SystemFinding | PriceChangeFinding | undefined;

/**
 * A figure cell: the numbers behind the figure, in the units uploaded. Points and rows in which the system is not defined are
 * left out and counted.
 * Errors: `Refusal` (a good or a column that is not there, what the system has none of), `Cancelled`.
 */
export function runFigure(
  specification: FigureSpecification,
  basis: FigureBasis,
  data: PreparedData,
  control: RunControl = QUIET,
): FigureFinding {
  const { drawn, ...how } = drawnOf(specification, basis, data, control);
  return figureFinding.parse({
    kind: "figure",
    dataFingerprint: data.fingerprint,
    level: specification.level,
    ...how,
    drawn,
    ...(basis && { checks: basis.checks, tests: basis.tests }),
    ...(basis?.kind === "system" && basis.conditionalOn !== undefined && { conditionalOn: basis.conditionalOn }),
    ...(basis?.kind === "system" ? caveatsOf(basis) : basis?.caveats && { caveats: basis.caveats }),
  });
}

function drawnOf(
  specification: FigureSpecification,
  basis: FigureBasis,
  data: PreparedData,
  control: RunControl,
): DrawnWith {
  const { show } = specification;
  if (show === "incidence") return incidenceDrawn(requireKind(basis, "price change"));
  const goods = placesOf(specification.goods, data.goods);
  if (show === "shares by group") return sharesByGroup(specification, goods, data);
  if (show === "price distribution") return priceDistribution(goods[0], data);
  const system = requireKind(basis, "system");
  const asked = { specification, goods, system, data, control };
  const errors = { standardErrors: standardErrorsPhrase(system) };
  switch (show) {
    case "engel curves":
      return { ...errors, ...engelDrawn(asked) };
    case "demand curve":
      return { ...errors, ...demandDrawn(asked) };
    case "largest eigenvalue":
      return { ...errors, ...eigenvalueDrawn(asked) };
    case "elasticities":
      return { ...errors, ...elasticitiesDrawn(asked) };
    case "fit of shares":
      return fitOfShares(asked);
  }
}

function requireKind<K extends "system" | "price change">(basis: FigureBasis, kind: K) {
  if (basis?.kind !== kind) throw new Error(`a figure of a ${kind} was given ${basis?.kind ?? "none"}`);
  return basis as Extract<FigureBasis, { kind: K }>;
}

/** Places of the goods named, in the order of the data; of all of them where none is. */
function placesOf(named: readonly string[] | undefined, goods: readonly string[]): number[] {
  const unknown = named?.filter((good) => !goods.includes(good)) ?? [];
  if (unknown.length > 0) {
    throw new Refusal(
      unknown.map((good) => ({
        sentence: `There is no good ${good}; the goods are ${listSome([...goods])}.`,
        key: ["goods"],
      })),
    );
  }
  return goods.flatMap((good, i) => (named === undefined || named.includes(good) ? [i] : []));
}
