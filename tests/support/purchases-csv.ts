import { seededRandom } from "../../shared/numerics/random.ts";

interface Wanted {
  readonly goods: number;
  readonly rows: number;
  readonly seed: number;
}

/** Purchases as the text of a CSV, p1 to pn and q1 to qn: large enough that estimating on them takes a while. */
export function purchasesCsv({ goods, rows, seed }: Wanted): string {
  const random = seededRandom(seed);
  const names = (letter: string) => Array.from({ length: goods }, (_, i) => `${letter}${i + 1}`);
  const lines = [[...names("p"), ...names("q")].join(",")];
  for (let row = 0; row < rows; row++) {
    const total = 100 * Math.exp(0.4 * random.normal());
    const prices = Array.from({ length: goods }, () => Math.exp(0.25 * random.normal()));
    const wants = prices.map((price) => Math.exp(0.2 * random.normal()) * price ** -0.3);
    const wanted = wants.reduce((sum, want) => sum + want, 0);
    const bought = prices.map((price, i) => (total * wants[i]) / wanted / price);
    lines.push([...prices, ...bought].map((value) => value.toPrecision(6)).join(","));
  }
  return `${lines.join("\n")}\n`;
}
