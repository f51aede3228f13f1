import { describe, expect, it } from 'vitest';
import { normalQuantile, normalsOf, philox, uniformsOf } from '../../../core/math/random';

const hex = (words: Uint32Array): string =>
  Array.from(words, (word) => word.toString(16).padStart(8, '0')).join(' ');

describe('Philox 4×32-10', () => {
  // The known answers published with Salmon et al. 2011 (from memory).
  it.each([
    [[0, 0, 0, 0], [0, 0], '6627e8d5 e169c58d bc57ac4c 9b00dbd8'],
    [
      [0xffffffff, 0xffffffff, 0xffffffff, 0xffffffff],
      [0xffffffff, 0xffffffff],
      '408f276d 41c83b0e a20bc7c6 6d5451fd',
    ],
    [
      [0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344],
      [0xa4093822, 0x299f31d0],
      'd16cfe09 94fdcceb 5001e420 24126ea1',
    ],
  ])('gives the published words for counter %j', (counter, key, words) => {
    const own = Uint32Array.from(counter);
    philox(own, key[0], key[1]);
    expect(hex(own)).toBe(words);
  });
});

describe('the normal quantile', () => {
  // scipy.stats.norm.ppf, SciPy of Debian.
  it.each([
    [1e-300, -37.0470962993612],
    [1e-20, -9.262340089798409],
    [1e-8, -5.612001244174789],
    [0.001, -3.090232306167813],
    [0.0749, -1.4402382675279635],
    [0.076, -1.4325027208258116],
    [0.3, -0.5244005127080409],
    [0.6, 0.2533471031357997],
    [0.93, 1.475791028179171],
    [0.999, 3.090232306167813],
  ])('of %d is that of SciPy to 2e-15', (p, expected) => {
    expect(Math.abs(normalQuantile(p) / expected - 1)).toBeLessThan(2e-15);
  });
});

describe('numbers by counter', () => {
  it('are the same whatever the batch they are drawn in', () => {
    const whole = new Float64Array(100 * 7);
    normalsOf(5, 2, 0, 100, 7, whole);
    for (const [first, count] of [
      [0, 1],
      [17, 30],
      [99, 1],
    ]) {
      const part = new Float64Array(count * 7);
      normalsOf(5, 2, first, count, 7, part);
      expect(part).toEqual(whole.slice(first * 7, (first + count) * 7));
    }
  });

  it('differ between seeds, streams and items', () => {
    const draw = (seed: number, stream: number, first: number): string => {
      const out = new Float64Array(2);
      uniformsOf(seed, stream, first, 1, 2, out);
      return out.join();
    };
    const all = [draw(1, 0, 0), draw(2, 0, 0), draw(1, 1, 0), draw(1, 0, 1), draw(1, 0, 2 ** 32)];
    expect(new Set(all).size).toBe(all.length);
  });

  it('have the moments of the standard normal distribution, uncorrelated', () => {
    const n = 100_000;
    const out = new Float64Array(n * 3);
    normalsOf(9, 0, 0, n, 3, out);
    const mean = (f: (i: number) => number): number => {
      let sum = 0;
      for (let i = 0; i < n; i++) sum += f(i);
      return sum / n;
    };
    // Five standard errors of each mean.
    expect(Math.abs(mean((i) => out[i * 3]))).toBeLessThan(5 / Math.sqrt(n));
    expect(Math.abs(mean((i) => out[i * 3] ** 2) - 1)).toBeLessThan(5 * Math.sqrt(2 / n));
    expect(Math.abs(mean((i) => out[i * 3] ** 4) - 3)).toBeLessThan(5 * Math.sqrt(96 / n));
    expect(Math.abs(mean((i) => out[i * 3] * out[i * 3 + 1]))).toBeLessThan(5 / Math.sqrt(n));
    expect(Math.abs(mean((i) => out[i * 3 + 1] * out[i * 3 + 2]))).toBeLessThan(5 / Math.sqrt(n));
  });
});
