import type { CoefficientPlace, DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";

export interface CoefficientName {
  readonly block: string;
  readonly symbol: string;
  readonly good: string;
  /** The price (a good) or the demographic it belongs to. */
  readonly column?: string;
}

/** Names of all k coefficients in the order of the system's layout. */
export function coefficientNames(
  system: DemandSystem,
  size: SystemSize,
  goods: readonly string[],
  demographics: readonly string[],
): CoefficientName[] {
  const blocks = new Map(system.blocks.map((block) => [block.name, block]));
  return system.layout(size).map((place: CoefficientPlace) => {
    const block = blocks.get(place.block)!;
    const columns = block.columns === "goods" ? goods : demographics;
    return {
      block: block.name,
      symbol: block.symbol,
      good: goods[place.good],
      ...(place.column !== undefined && { column: columns[place.column] }),
    };
  });
}

/** "γ of bread on milk". */
export function labelOfCoefficient({ symbol, good, column }: CoefficientName): string {
  return column === undefined ? `${symbol} of ${good}` : `${symbol} of ${good} on ${column}`;
}
