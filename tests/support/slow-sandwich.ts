import { inverse, LuDecomposition, Matrix } from "ml-matrix";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import type { SystemFinding } from "../../shared/schemas/system.ts";
import { SYSTEMS, systemOf } from "../../shared/systems/index.ts";

/**
 * The sandwich the obvious way, sharing no code with the engine: scores of every row from the system's own shares and
 * their derivatives, Ω from the residual covariance of the finding, dense matrices. For maximum likelihood in systems
 * whose shares need no more than the point (not LA-AIDS, whose index holds the row's own shares).
 */
export function slowSandwich(finding: SystemFinding, data: PreparedData, groups: ArrayLike<number>): number[][] {
  const { system, size } = systemOf(finding.fitted);
  const { theta } = finding.fitted;
  const free = SYSTEMS[finding.fitted.form].free(size, finding.fitted.imposed);
  const kept = data.goods.map((_, i) => i).filter((i) => data.goods[i] !== finding.dropped);
  const sigma = new Matrix(kept.map((i) => kept.map((j) => finding.residualCovariance[i][j])));
  const omega = inverse(sigma);
  const s = new Matrix(free.matrix);
  const bread = Matrix.zeros(s.columns, s.columns);
  const scores = new Map<number, Matrix>();
  for (let t = 0; t < data.rows; t++) {
    const point = {
      prices: data.logPrices.map((column) => Math.exp(column[t])),
      total: Math.exp(data.logTotal[t]),
      demographics: finding.fitted.demographics.map((name) => data.numeric.get(name)![t]),
    };
    const predicted = system.slopes(theta, size, point).shares;
    const derivatives = system.slopeDerivatives(theta, size, point).shares;
    const errors = Matrix.columnVector(kept.map((i) => data.shares[i][t] - predicted[i]));
    const slopes = new Matrix(kept.map((i) => derivatives[i])).mmul(s);
    const weight = data.weights?.[t] ?? 1;
    const pushed = slopes.transpose().mmul(omega);
    bread.add(pushed.mmul(slopes).mul(weight));
    const score = pushed.mmul(errors).mul(weight);
    const known = scores.get(groups[t]);
    scores.set(groups[t], known === undefined ? score : known.add(score));
  }
  const meat = Matrix.zeros(s.columns, s.columns);
  for (const score of scores.values()) meat.add(score.mmul(score.transpose()));
  const solver = new LuDecomposition(bread);
  const count = scores.size;
  const covariance = solver.solve(solver.solve(meat).transpose()).mul(count / (count - 1));
  return s.mmul(covariance).mmul(s.transpose()).to2DArray();
}
