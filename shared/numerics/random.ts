export interface Random {
  /** In [0, 1), 53 bits. */
  uniform(): number;
  /** Standard normal. */
  normal(): number;
  /** One of 0, …, n − 1, each equally likely. */
  integer(n: number): number;
}

const MASK = (1n << 64n) - 1n;

/** Splitmix64 (Steele, Lea & Flood 2014): spreads a seed over the state of another generator. */
export function splitmix64(seed: bigint): () => bigint {
  let state = seed & MASK;
  return () => {
    state = (state + 0x9e3779b97f4a7c15n) & MASK;
    let mixed = state;
    mixed = ((mixed ^ (mixed >> 30n)) * 0xbf58476d1ce4e5b9n) & MASK;
    mixed = ((mixed ^ (mixed >> 27n)) * 0x94d049bb133111ebn) & MASK;
    return mixed ^ (mixed >> 31n);
  };
}

/** Xoshiro128** 1.1 (Blackman & Vigna 2021, ACM Transactions on Mathematical Software 47): 32 bits a call. */
export function xoshiro128(a: number, b: number, c: number, d: number): () => number {
  let s0 = a | 0;
  let s1 = b | 0;
  let s2 = c | 0;
  let s3 = d | 0;
  return () => {
    const product = Math.imul(s1, 5);
    const result = Math.imul((product << 7) | (product >>> 25), 9);
    const shifted = s1 << 9;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= shifted;
    s3 = (s3 << 11) | (s3 >>> 21);
    return result >>> 0;
  };
}

/**
 * A generator that repeats bit for bit from its seed, an integer of up to 53 bits.
 *
 * `stream` separates sequences that must not depend on who draws first: draw b of a bootstrap takes
 * stream b, and the number of threads does not matter.
 */
export function seededRandom(seed: number, stream = 0): Random {
  if (!Number.isSafeInteger(seed) || !Number.isSafeInteger(stream)) {
    throw new RangeError(`a seed and a stream are integers, not ${seed} and ${stream}`);
  }
  const ofStream = splitmix64(BigInt(stream))();
  const mix = splitmix64(stream === 0 ? BigInt(seed) : BigInt(seed) ^ ofStream);
  const first = mix();
  const second = mix();
  const next = xoshiro128(
    Number(first & 0xffffffffn),
    Number(first >> 32n),
    Number(second & 0xffffffffn),
    Number(second >> 32n),
  );
  const uniform = () => ((next() >>> 5) * 67108864 + (next() >>> 6)) / 9007199254740992;
  return { uniform, normal: polarNormal(uniform), integer: (n) => integerBelow(n, uniform) };
}

/** Marsaglia & Bray's (1964) polar method; the second of each pair is kept for the next call. */
function polarNormal(uniform: () => number): () => number {
  let spare: number | undefined;
  return () => {
    if (spare !== undefined) {
      const kept = spare;
      spare = undefined;
      return kept;
    }
    for (;;) {
      const u = 2 * uniform() - 1;
      const v = 2 * uniform() - 1;
      const square = u * u + v * v;
      if (square === 0 || square >= 1) continue;
      const factor = Math.sqrt((-2 * Math.log(square)) / square);
      spare = v * factor;
      return u * factor;
    }
  };
}

function integerBelow(n: number, uniform: () => number): number {
  if (!Number.isSafeInteger(n) || n < 1) throw new RangeError(`cannot draw an integer below ${n}`);
  return Math.floor(uniform() * n);
}
