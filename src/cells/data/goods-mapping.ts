import type { KeyPath, Written } from "../form/written.ts";

export const SLOTS = ["price", "expenditure", "quantity"] as const;
export type Slot = (typeof SLOTS)[number];

/** What the third of price, expenditure and quantity is, when the other two are given. */
export const FOLLOWS: Record<Slot, string> = {
  price: "expenditure ÷ quantity",
  expenditure: "price × quantity",
  quantity: "expenditure ÷ price",
};

/** Which column gives way when a third is chosen: two say everything, three could contradict one another. */
const GIVES_WAY: Record<Slot, Slot> = { price: "quantity", expenditure: "quantity", quantity: "expenditure" };

export type Mapping = Partial<Record<Slot, string>>;

export function mappingOf(written: Written, good: string): Mapping {
  const entries = SLOTS.map((slot) => [slot, written.text("goods", good, slot)] as const);
  return Object.fromEntries(entries.filter(([, column]) => column !== ""));
}

/** Whether the other two slots are given, so that this one follows from them. */
export function follows(mapping: Mapping, slot: Slot): boolean {
  return SLOTS.every((other) => (other === slot) === (mapping[other] === undefined));
}

/** The edits that put a column (or none) into a good's slot. */
export function chooseColumn(
  mapping: Mapping,
  good: string,
  slot: Slot,
  column: string,
): (readonly [path: KeyPath, value: string | Record<string, string> | undefined])[] {
  const path = ["goods", good, slot];
  if (column === "") {
    const rest = SLOTS.filter((other) => other !== slot && mapping[other] !== undefined);
    // Removing a good's last column would remove the good with it.
    return rest.length === 0 ? [[["goods", good], {}]] : [[path, undefined]];
  }
  const third = SLOTS.every((other) => other === slot || mapping[other] !== undefined);
  const yields = ["goods", good, GIVES_WAY[slot]];
  return third && mapping[slot] === undefined
    ? [
        [path, column],
        [yields, undefined],
      ]
    : [[path, column]];
}

const WORDS = ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve"];

/** "six"; beyond twelve in digits. */
export const inWords = (count: number): string => WORDS[count] ?? String(count);

/** "six, each a price and an expenditure" when they are alike, else how many by which two. */
export function goodsInWords(mappings: readonly Mapping[]): string {
  const count = inWords(mappings.length);
  const pairs = new Set(mappings.map((mapping) => SLOTS.filter((slot) => mapping[slot] !== undefined).join(" and ")));
  const [pair] = pairs;
  if (pairs.size === 1 && pair) return `${count}, each by ${pair}`;
  return mappings.length === 0 ? "none yet" : `${count}, by ${[...pairs].filter(Boolean).join("; ")}`;
}
