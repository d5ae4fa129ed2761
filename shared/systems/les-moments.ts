import type { SystemSize } from "./demand-system.ts";
import { lesParts, lesPlaces } from "./les-parts.ts";
import type { BaseColumn, MomentForm, MomentTerm } from "./moment-form.ts";

type Entry = [good: number, term: number, value: number];

/**
 * Both forms of the linear expenditure system are one: a response is b_i times a scale plus
 * Σ_j (δ_ij − b_i) c_j(z) times a price column,
 *
 *     w_i     = b_i     + Σ_j (δ_ij − b_i) c_j(z) p_j/x      (errors on shares)
 *     p_i q_i = b_i x   + Σ_j (δ_ij − b_i) c_j(z) p_j        (errors on expenditures)
 *
 * so with Z = (…, price columns, their products with demographics) the coefficients differ only in the
 * place of the scale: the constant, or the column of x beside a constant that no equation has.
 */
function momentForm(scale: "constant" | BaseColumn, price: (good: number) => BaseColumn): MomentForm {
  const scaleTerm = scale === "constant" ? 0 : 1;
  const first = scaleTerm + 1;
  const priceTerm = (j: number) => first + j;
  const productTerm = ({ goods: n, demographics: s }: SystemSize, j: number, k: number) => first + n + j * s + k;
  return {
    terms: ({ goods: n, demographics: s }) => {
      const terms: MomentTerm[] = [{ kind: "constant" }];
      if (scale !== "constant") terms.push({ kind: "column", column: scale });
      for (let j = 0; j < n; j++) terms.push({ kind: "column", column: price(j) });
      for (let j = 0; j < n; j++) {
        for (let index = 0; index < s; index++) {
          terms.push({ kind: "product", left: { kind: "demographic", index }, right: price(j) });
        }
      }
      return terms;
    },
    coefficients: (theta, size) => {
      const { goods: n, demographics: s } = size;
      const { committed, demographic, marginal } = lesParts(theta, size);
      return marginal.map((b, i) => {
        const row = new Array<number>(first + n + n * s).fill(0);
        row[scaleTerm] = b;
        for (let j = 0; j < n; j++) {
          const factor = (i === j ? 1 : 0) - b;
          row[priceTerm(j)] = factor * committed[j];
          for (let k = 0; k < s; k++) row[productTerm(size, j, k)] = factor * demographic[j * s + k];
        }
        return row;
      });
    },
    derivatives: (theta, size) => {
      const { goods: n, demographics: s } = size;
      const { committed, demographic, marginal } = lesParts(theta, size);
      const places = lesPlaces(size);
      const list: Entry[][] = Array.from({ length: places.count }, () => []);
      for (let i = 0; i < n; i++) {
        const byMarginal = list[places.marginal(i)];
        byMarginal.push([i, scaleTerm, 1]);
        for (let j = 0; j < n; j++) {
          const factor = (i === j ? 1 : 0) - marginal[i];
          list[places.committed(j)].push([i, priceTerm(j), factor]);
          byMarginal.push([i, priceTerm(j), -committed[j]]);
          for (let k = 0; k < s; k++) {
            list[places.demographic(j, k)].push([i, productTerm(size, j, k), factor]);
            byMarginal.push([i, productTerm(size, j, k), -demographic[j * s + k]]);
          }
        }
      }
      return list;
    },
  };
}

/** Responses w_i; Z = (1, p_j/x, z_k p_j/x). */
export const lesShareMoments: MomentForm = momentForm("constant", (good) => ({ kind: "price over total", good }));

/** Responses p_i q_i in units of estimation; Z = (1, x, p_j, z_k p_j), of which the constant stands in no equation. */
export const lesExpenditureMoments: MomentForm = momentForm({ kind: "total" }, (good) => ({ kind: "price", good }));
