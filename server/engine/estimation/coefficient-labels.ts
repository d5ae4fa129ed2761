import type {
  BlockColumns,
  CoefficientPlace,
  DemandSystem,
  SystemSize,
} from "../../../shared/systems/demand-system.ts";

export interface CoefficientName {
  readonly block: string;
  readonly symbol: string;
  readonly good: string;
  /** The price (a good), the demographic, or the product it belongs to: "milk", "milk × y". */
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
    return {
      block: block.name,
      symbol: block.symbol,
      good: goods[place.good],
      ...(place.column !== undefined && { column: columnOf(block.columns, place.column, goods, demographics) }),
    };
  });
}

function columnOf(
  columns: BlockColumns,
  at: number,
  goods: readonly string[],
  demographics: readonly string[],
): string {
  switch (columns) {
    case "powers":
      return powerName(at + 1);
    case "goods":
      return goods[at];
    case "goods by expenditure":
      return `${goods[at]} × y`;
    case "demographics by expenditure":
      return `${demographics[at]} × y`;
    case "goods by demographics":
      return `${goods[at % goods.length]} × ${demographics[Math.floor(at / goods.length)]}`;
    default:
      return demographics[at];
  }
}

const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";

/** "y", "y²": y is real expenditure. */
function powerName(power: number): string {
  return power === 1 ? "y" : `y${SUPERSCRIPTS[power]}`;
}

/** "γ of bread on milk". */
export function labelOfCoefficient({ symbol, good, column }: CoefficientName): string {
  return column === undefined ? `${symbol} of ${good}` : `${symbol} of ${good} on ${column}`;
}
