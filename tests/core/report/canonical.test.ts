import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { canonicalJson, NonFiniteError } from '../../../core/report/canonical';

describe('canonical JSON', () => {
  it('does not depend on the order in which keys were put in', () => {
    fc.assert(
      fc.property(fc.dictionary(fc.string(), fc.jsonValue()), (value) => {
        const turned = Object.fromEntries(Object.entries(value).reverse());
        expect(canonicalJson(turned)).toBe(canonicalJson(value));
      }),
    );
  });

  it('reads back as the same value', () => {
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        // JSON itself writes −0 as 0.
        const plain = JSON.parse(JSON.stringify(value));
        expect(JSON.parse(canonicalJson(value))).toEqual(plain);
      }),
    );
  });

  it('refuses NaN and infinities and names their path', () => {
    for (const bad of [Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(() => canonicalJson({ a: [{ b: 1 }, { b: bad }] })).toThrow(NonFiniteError);
      expect(() => canonicalJson({ a: [{ b: 1 }, { b: bad }] })).toThrow('report.a[1].b');
    }
  });
});

describe('the hash of the fingerprint', () => {
  it('is SHA-256 as in FIPS 180-4, example "abc" (NIST)', () => {
    expect(bytesToHex(sha256(utf8ToBytes('abc')))).toBe(
      'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad',
    );
  });
});
