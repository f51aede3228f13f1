/** Random numbers by counter: number i of a stream is the same whoever draws it and in what order. */

const M0 = 0xd2511f53;
const M1 = 0xcd9e8d57;
const W0 = 0x9e3779b9;
const W1 = 0xbb67ae85;
const ROUNDS = 10;

/** High word of the product of two unsigned 32-bit words. */
function high(a: number, b: number): number {
  const a0 = a & 0xffff;
  const a1 = a >>> 16;
  const b0 = b & 0xffff;
  const b1 = b >>> 16;
  const low = a0 * b0;
  const mid = a1 * b0 + (low >>> 16);
  const mid2 = a0 * b1 + (mid & 0xffff);
  return (a1 * b1 + Math.floor(mid / 65536) + Math.floor(mid2 / 65536)) >>> 0;
}

/**
 * Four random words for a counter and a key: Philox 4×32 with ten rounds.
 *
 * @param words holds the counter (4 words) and receives the random words
 * @param key0, key1 the key
 * Source: Salmon, Moraes, Dror & Shaw (2011), Parallel random numbers: as easy as 1, 2, 3 (SC11).
 */
export function philox(words: Uint32Array, key0: number, key1: number): void {
  let [x0, x1, x2, x3] = words;
  let k0 = key0 >>> 0;
  let k1 = key1 >>> 0;
  for (let round = 0; round < ROUNDS; round++) {
    const h0 = high(M0, x0);
    const l0 = Math.imul(M0, x0);
    const h1 = high(M1, x2);
    const l1 = Math.imul(M1, x2);
    x0 = (h1 ^ x1 ^ k0) >>> 0;
    x1 = l1 >>> 0;
    x2 = (h0 ^ x3 ^ k1) >>> 0;
    x3 = l0 >>> 0;
    k0 = (k0 + W0) >>> 0;
    k1 = (k1 + W1) >>> 0;
  }
  words[0] = x0;
  words[1] = x1;
  words[2] = x2;
  words[3] = x3;
}

/** A number inside (0, 1), 53 bits, from two words. */
const uniform = (a: number, b: number): number => {
  const u = ((a >>> 5) * 67108864 + (b >>> 6)) * 2 ** -53;
  return u + 2 ** -54;
};

/**
 * Uniform numbers inside (0, 1).
 *
 * @param seed, stream which sequence: unsigned 32-bit words
 * @param first, count  items of the sequence, each of `dimension` numbers
 * @param out           receives count × dimension numbers
 */
export function uniformsOf(
  seed: number,
  stream: number,
  first: number,
  count: number,
  dimension: number,
  out: Float64Array,
): void {
  const words = new Uint32Array(4);
  let at = 0;
  for (let item = first; item < first + count; item++) {
    for (let k = 0; k < dimension; k += 2) {
      words[0] = item >>> 0;
      words[1] = Math.floor(item / 2 ** 32);
      words[2] = k;
      words[3] = stream;
      philox(words, seed, 0);
      out[at++] = uniform(words[0], words[1]);
      if (k + 1 < dimension) out[at++] = uniform(words[2], words[3]);
    }
  }
}

/**
 * Standard normal numbers, by the inverse of the distribution.
 *
 * Arguments as `uniformsOf`. Logarithm and square root are the only functions used.
 */
export function normalsOf(
  seed: number,
  stream: number,
  first: number,
  count: number,
  dimension: number,
  out: Float64Array,
): void {
  uniformsOf(seed, stream, first, count, dimension, out);
  for (let i = 0; i < count * dimension; i++) out[i] = normalQuantile(out[i]);
}

const horner = (c: readonly number[], x: number): number => {
  let sum = c[c.length - 1];
  for (let i = c.length - 2; i >= 0; i--) sum = sum * x + c[i];
  return sum;
};

/**
 * Quantile of the standard normal distribution.
 *
 * @param p probability, inside (0, 1)
 * Accuracy: 1e-15 relative.
 * Source: Wichura (1988), Applied Statistics 37, 477 (algorithm AS 241, PPND16).
 */
export function normalQuantile(p: number): number {
  const q = p - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return (q * horner(CENTRE_OVER, r)) / horner(CENTRE_UNDER, r);
  }
  const r = Math.sqrt(-Math.log(q < 0 ? p : 1 - p));
  const size =
    r <= 5
      ? horner(MIDDLE_OVER, r - 1.6) / horner(MIDDLE_UNDER, r - 1.6)
      : horner(TAIL_OVER, r - 5) / horner(TAIL_UNDER, r - 5);
  return q < 0 ? -size : size;
}

const CENTRE_OVER = [
  3.387132872796366608, 133.14166789178437745, 1971.5909503065514427, 13731.693765509461125,
  45921.953931549871457, 67265.770927008700853, 33430.575583588128105, 2509.0809287301226727,
];
const CENTRE_UNDER = [
  1, 42.313330701600911252, 687.1870074920579083, 5394.1960214247511077, 21213.794301586595867,
  39307.89580009271061, 28729.085735721942674, 5226.495278852854561,
];
const MIDDLE_OVER = [
  1.42343711074968357734, 4.6303378461565452959, 5.7694972214606914055, 3.64784832476320460504,
  1.27045825245236838258, 0.24178072517745061177, 0.0227238449892691845833,
  7.7454501427834140764e-4,
];
const MIDDLE_UNDER = [
  1, 2.05319162663775882187, 1.6763848301838038494, 0.68976733498510000455, 0.14810397642748007459,
  0.0151986665636164571966, 5.475938084995344946e-4, 1.05075007164441684324e-9,
];
const TAIL_OVER = [
  6.6579046435011037772, 5.4637849111641143699, 1.7848265399172913358, 0.29656057182850489123,
  0.026532189526576123093, 0.0012426609473880784386, 2.71155556874348757815e-5,
  2.01033439929228813265e-7,
];
const TAIL_UNDER = [
  1, 0.59983220655588793769, 0.13692988092273580531, 0.0148753612908506148525,
  7.868691311456132591e-4, 1.8463183175100546818e-5, 1.4215117583164458887e-7,
  2.04426310338993978564e-15,
];
