import { describe, expect, it } from 'vitest';
import { adopt, intervalOf } from '../../../core/uncertainty/adopt';

describe('the estimate to go by', () => {
  it('is the first order where nothing was carried, and nothing without that', () => {
    expect(adopt(0.2, null, null)).toEqual({
      value: 0.2,
      range95: [0.2, 0.2],
      from: 'first-order',
      firstOrderAgrees: null,
      ensembleAgrees: null,
    });
    expect(adopt(null, { count: 0, impacts: 0 }, null)).toBeNull();
  });

  it('is the count with its exact interval where there is no rare-event estimate', () => {
    const plain = { count: 10_000, impacts: 400 };
    const adopted = adopt(0.041, plain, null);
    expect(adopted?.from).toBe('ensemble');
    expect(adopted?.value).toBe(0.04);
    expect(adopted?.range95).toEqual(intervalOf(plain));
    expect(adopted?.firstOrderAgrees).toBe(true);
    expect(adopt(0.08, plain, null)?.firstOrderAgrees).toBe(false);
    expect(adopt(0.02, plain, null)?.firstOrderAgrees).toBe(false);
  });

  it('is the rare-event estimate where there is one, held against the count and the first order', () => {
    const plain = { count: 10_000, impacts: 2 };
    const adopted = adopt(1e-4, plain, { value: 2e-4, relativeError: 0.05 });
    expect(adopted?.from).toBe('rare-event');
    // 1.96 σ in the logarithm.
    expect(adopted?.range95[0]).toBeCloseTo(2e-4 * Math.exp(-0.098), 9);
    expect(adopted?.range95[1]).toBeCloseTo(2e-4 * Math.exp(0.098), 9);
    expect(adopted?.ensembleAgrees).toBe(true);
    expect(adopted?.firstOrderAgrees).toBe(false);
    const off = adopt(null, plain, { value: 1e-7, relativeError: 0.05 });
    expect(off?.ensembleAgrees).toBe(false);
    expect(off?.firstOrderAgrees).toBeNull();
  });

  it('says no less than what the count leaves open where no impact was found', () => {
    const plain = { count: 10_000, impacts: 0 };
    const adopted = adopt(0, plain, { value: 0, relativeError: null });
    expect(adopted?.range95).toEqual([0, intervalOf(plain)[1]]);
    expect(adopted?.firstOrderAgrees).toBe(true);
    expect(adopt(1e-6, plain, { value: 0, relativeError: null })?.firstOrderAgrees).toBe(false);
  });

  it('is the count where clones hit that the search for rare impacts did not lead to', () => {
    const plain = { count: 10_000, impacts: 3 };
    const adopted = adopt(null, plain, { value: 0, relativeError: null });
    expect([adopted?.from, adopted?.value]).toEqual(['ensemble', 3e-4]);
  });
});
