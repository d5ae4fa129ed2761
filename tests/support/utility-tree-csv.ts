import { seededRandom } from "../../shared/numerics/random.ts";

/** Marginal shares and committed quantities of five goods; the first three are one group without committed quantities. */
export const TREE: { readonly marginal: readonly number[]; readonly committed: readonly number[] } = {
  marginal: [0.2, 0.15, 0.15, 0.3, 0.2],
  committed: [0, 0, 0, 0.4, 0.25],
};

/** Of the group's goods within it. */
const WITHIN = [0.4, 0.3, 0.3];

/**
 * Purchases of households that follow Stone and Geary's utility, with next to no noise. What the group's goods cost
 * together has an exact price, Π p_j^0.4, 0.3, 0.3: column `food`, beside what is spent on each good and on the group.
 */
export function treeCsv(rows = 240, seed = 11): string {
  const random = seededRandom(seed);
  const head = ["p1", "p2", "p3", "p4", "p5", "e1", "e2", "e3", "e4", "e5", "food", "e_food", "quarter"];
  const lines = Array.from({ length: rows }, (_, t) => {
    const prices = TREE.marginal.map(() => Math.exp(0.25 * random.normal()));
    const total = 4 * Math.exp(0.3 * random.normal());
    const spare = total - TREE.committed.reduce((sum, c, j) => sum + c * prices[j], 0);
    const shares = TREE.marginal.map((b, j) => (TREE.committed[j] * prices[j] + b * spare) / total);
    const noise = shares.map(() => 2e-4 * random.normal());
    const shift = noise.reduce((sum, one) => sum + one, 0) / noise.length;
    const spent = shares.map((share, j) => total * (share + noise[j] - shift));
    const food = Math.exp(WITHIN.reduce((sum, b, j) => sum + b * Math.log(prices[j]), 0));
    return [...prices, ...spent, food, spent[0] + spent[1] + spent[2], (t % 4) + 1].join(",");
  });
  return `${[head.join(","), ...lines].join("\n")}\n`;
}

/** The three goods of the group, the budget of the group and two others, and every good at once. */
export const TREE_GOODS = {
  food: "goods:\n  grains: {price: p1, expenditure: e1}\n  dairy: {price: p2, expenditure: e2}\n  meat: {price: p3, expenditure: e3}\n",
  budget:
    "goods:\n  food: {price: food, expenditure: e_food}\n  rent: {price: p4, expenditure: e4}\n  travel: {price: p5, expenditure: e5}\n",
  all: `goods:\n${["grains", "dairy", "meat", "rent", "travel"].map((good, i) => `  ${good}: {price: p${i + 1}, expenditure: e${i + 1}}`).join("\n")}\n`,
} as const;
