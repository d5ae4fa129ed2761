/** Relative tolerance of comparisons: costs that differ by less are equal. */
const TOLERANCE = 1e-12;

/** A ratio C_ij/C_ii below this makes i strictly preferred to j. */
export const STRICT = 1 - TOLERANCE;

/** Whether a ratio C_ij/C_ii makes i directly revealed preferred to j. */
export function isWeakly(ratio: number): boolean {
  return ratio <= 1 + TOLERANCE;
}

/** Rows that are revealed preferred to one another, each way round. */
export interface PreferenceClasses {
  /** Of each row. */
  readonly classOf: Int32Array;
  /** Rows of each class. */
  readonly sizes: readonly number[];
}

/**
 * The strongly connected classes of the relation R (Tarjan 1972, SIAM Journal on Computing 1), every row of
 * `ratios` (T × T) read once and no path kept on the program's own stack.
 */
export function preferenceClasses(ratios: Float64Array, rows: number): PreferenceClasses {
  const UNSEEN = -1;
  const order = new Int32Array(rows).fill(UNSEEN);
  const low = new Int32Array(rows);
  const next = new Int32Array(rows);
  const classOf = new Int32Array(rows).fill(UNSEEN);
  const sizes: number[] = [];
  const open: number[] = [];
  const path: number[] = [];
  let seen = 0;
  const enter = (row: number) => {
    order[row] = low[row] = seen++;
    open.push(row);
    path.push(row);
  };
  const close = (row: number) => {
    let size = 0;
    for (let member = UNSEEN; member !== row; size++) {
      member = open.pop()!;
      classOf[member] = sizes.length;
    }
    sizes.push(size);
  };
  for (let root = 0; root < rows; root++) {
    if (order[root] !== UNSEEN) continue;
    enter(root);
    while (path.length > 0) {
      const row = path[path.length - 1];
      const to = next[row]++;
      if (to < rows) {
        if (to === row || !isWeakly(ratios[row * rows + to])) continue;
        if (order[to] === UNSEEN) enter(to);
        else if (classOf[to] === UNSEEN) low[row] = Math.min(low[row], order[to]);
        continue;
      }
      path.pop();
      if (path.length > 0) low[path[path.length - 1]] = Math.min(low[path[path.length - 1]], low[row]);
      if (low[row] === order[row]) close(row);
    }
  }
  return { classOf, sizes };
}

/** Rows from one to another, each directly revealed preferred to the next; the fewest there can be. */
export function shortestPath(ratios: Float64Array, rows: number, from: number, to: number): number[] {
  const before = new Int32Array(rows).fill(-1);
  const queue = [from];
  before[from] = from;
  for (let at = 0; at < queue.length && before[to] < 0; at++) {
    const row = queue[at];
    for (let other = 0; other < rows; other++) {
      if (before[other] >= 0 || !isWeakly(ratios[row * rows + other])) continue;
      before[other] = row;
      queue.push(other);
    }
  }
  const path = [to];
  while (path[0] !== from) path.unshift(before[path[0]]);
  return path;
}
