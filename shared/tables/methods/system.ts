import type { SystemSpecification } from "../../schemas/system.ts";
import type { PriceIndexName } from "../../systems/names.ts";
import { listed } from "../phrases.ts";
import type { ReferenceKey } from "../references.ts";
import { citing, countedIn, inWords, type MethodsParts, type Said, said } from "./parts.ts";

const INDICES: Readonly<Record<PriceIndexName, readonly [string, ReferenceKey]>> = {
  tornqvist: ["the log-linear Törnqvist price index", "moschini1995"],
  stone: ["Stone’s price index", "stone1954"],
  "lagged stone": ["Stone’s price index at the shares of the period before", "ealesUnnevehr1988"],
  laspeyres: ["the log-linear Laspeyres price index", "moschini1995"],
  paasche: ["the log-linear Paasche price index", "moschini1995"],
};

interface Named {
  readonly words: string;
  readonly cites: readonly ReferenceKey[];
}

function named(specification: SystemSpecification): Named {
  const { form, index = "tornqvist", errors } = specification;
  const of = (words: string, ...cites: ReferenceKey[]): Named => ({ words: `${words} ${citing(...cites)}`, cites });
  switch (form) {
    case "la-aids": {
      const [words, source] = INDICES[index];
      const changes = specification.differences ? " in first differences" : "";
      const system = of("a linear approximate almost ideal demand system", "deatonMuellbauer1980");
      return {
        words: `${system.words}${changes} with ${words} ${citing(source)}`,
        cites: [...system.cites, source],
      };
    }
    case "aids":
      return of("an almost ideal demand system", "deatonMuellbauer1980");
    case "quaids":
      return of("a quadratic almost ideal demand system", "banksBlundellLewbel1997");
    case "les": {
      const system = of("a linear expenditure system", "stone1954");
      return { ...system, words: `${system.words} in ${errors === "expenditures" ? "expenditures" : "budget shares"}` };
    }
    case "easi": {
      const system = of("an EASI demand system", "lewbelPendakur2009");
      return { ...system, words: `${system.words} with Engel curves of degree ${inWords(specification.degree ?? 3)}` };
    }
    case "rotterdam":
      return of("a Rotterdam system", "theil1965", "barten1966");
  }
}

/** What is estimated, of how many goods, with what shifting it. */
export function systemSentences({ specification, data }: MethodsParts): Said[] {
  const { form, demographics } = specification;
  const { words, cites } = named(specification);
  const goods = data ? ` for ${countedIn(Object.keys(data.goods).length, "good")}` : "";
  const isTranslated = form === "les" && demographics.length > 0;
  const shifts = demographics.length === 0 ? "" : `, with ${listed(demographics)} ${SHIFTING[form]}`;
  const translated: ReferenceKey[] = isTranslated ? ["pollakWales1981"] : [];
  const by = isTranslated ? ` ${citing("pollakWales1981")}` : "";
  return [
    said(`We estimate ${words}${goods}${shifts}${by}.`, [...cites, ...translated]),
    ...ownTerms(specification),
    ...timeTerms(specification),
  ];
}

const SHIFTING: Readonly<Record<SystemSpecification["form"], string>> = {
  "la-aids": "shifting the intercepts",
  aids: "shifting the intercepts",
  quaids: "shifting the intercepts",
  les: "shifting the committed quantities",
  easi: "entering every share equation",
  rotterdam: "entering every equation",
};

/** What belongs to one form: α₀, or EASI's real expenditure and products. */
function ownTerms(specification: SystemSpecification): Said[] {
  const { form, alpha0, interactions = [], "real expenditure": real = "exact" } = specification;
  if (form === "aids" || form === "quaids") {
    return [said(`The constant α₀ of the price index is fixed at ${String(alpha0).replace("-", "−")}.`)];
  }
  if (form !== "easi") return [];
  const how = real === "exact" ? "the implicit utility of the system itself" : "approximated with mean budget shares";
  const products =
    interactions.length === 0
      ? "no products of prices, expenditure and demographics enter"
      : `products of ${listed(interactions)} enter`;
  return [said(`Real expenditure is ${how}; ${products}.`)];
}

function timeTerms({ form, season, trend }: SystemSpecification): Said[] {
  const terms = [
    ...(season === undefined
      ? []
      : season.harmonics === undefined
        ? [`dummies for a season of ${inWords(season.period)} periods`]
        : [`${countedIn(season.harmonics, "harmonic")} of a season of ${inWords(season.period)} periods`]),
    ...(trend ? ["a linear trend"] : []),
  ];
  if (terms.length === 0) return [];
  const enter = terms.length === 1 && !terms[0].startsWith("dummies") && trend ? "enters" : "enter";
  return [
    said(`Besides, ${listed(terms)} ${enter} ${form === "les" ? "the committed quantities" : "every equation"}.`),
  ];
}
