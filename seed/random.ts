import normalQuantile from '@stdlib/stats-base-dists-normal-quantile';

/** A stream of random numbers that depends on its seed alone. */
export interface RandomStream {
  /** The next 32 random bits, as a whole number from 0 to 2³² − 1. */
  bits(): number;
  /** Uniform on the open interval (0, 1), 52 bits deep; never 0 and never 1. */
  uniform(): number;
  /** A normal deviate with mean 0 and the given standard deviation. */
  normal(sd: number): number;
}

/** A stream of random numbers from a seed, a whole number taken modulo 2³². */
export function randomStream(seed: number): RandomStream {
  const expand = splitmix(seed);
  const bits = xoshiro([expand(), expand(), expand(), expand()]);

  function uniform(): number {
    const high = bits() >>> 6;
    const low = bits() >>> 6;
    return (high * 2 ** 26 + low + 0.5) / 2 ** 52;
  }

  return {
    bits,
    uniform,
    // By inversion, so that every deviate takes the same count of bits and a place in the stream is a place in time.
    normal: (sd) => sd * normalQuantile(uniform(), 0, 1),
  };
}

/**
 * xoshiro128** 1.1 of D. Blackman and S. Vigna ("Scrambled linear pseudorandom number generators",
 * ACM Transactions on Mathematical Software 47, 2021; prng.di.unimi.it/xoshiro128starstar.c, public domain):
 * 32 bits a call, period 2¹²⁸ − 1. Not all four words of the state may be zero.
 */
export function xoshiro(state: [number, number, number, number]): () => number {
  let [a, b, c, d] = state;
  return () => {
    const result = Math.imul(rotateLeft(Math.imul(b, 5), 7), 9) >>> 0;
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = rotateLeft(d, 11);
    return result;
  };
}

function rotateLeft(word: number, places: number): number {
  return (word << places) | (word >>> (32 - places));
}

/** SplitMix with 32 bits and the finaliser of MurmurHash3 (A. Appleby, public domain): spreads a seed over a state. */
function splitmix(seed: number): () => number {
  let state = seed | 0;
  return () => {
    state = (state + 0x9e3779b9) | 0;
    let word = state;
    word = Math.imul(word ^ (word >>> 16), 0x85ebca6b);
    word = Math.imul(word ^ (word >>> 13), 0xc2b2ae35);
    return word ^ (word >>> 16);
  };
}
