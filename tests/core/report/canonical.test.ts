import { createHash } from 'node:crypto';
import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  canonicalJson,
  fingerprintOf,
  NonFiniteError,
  reportJsonText,
  sealReport,
} from '../../../core/report/canonical';
import { writeFindings } from '../../../core/report/findings';
import { REPORT_VERSION, type Report } from '../../../core/report/report';
import { draftOf, GRAZE, IMPACT, PASS } from './drafts';

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

  it('keeps every bit of a number', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(JSON.parse(canonicalJson([value]))[0]).toBe(value === 0 ? 0 : value);
      }),
    );
  });

  it('leaves out a key without a value', () => {
    expect(canonicalJson({ b: undefined, a: [null, 'ξ'] })).toBe('{"a":[null,"ξ"]}');
  });

  it('refuses NaN and infinities and names their path', () => {
    for (const bad of [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]) {
      expect(() => canonicalJson({ a: [{ b: 1 }, { b: bad }] })).toThrow(NonFiniteError);
      expect(() => canonicalJson({ a: [{ b: 1 }, { b: bad }] })).toThrow('report.a[1].b');
    }
  });
});

describe('the hash of the fingerprint', () => {
  it('is SHA-256: examples of FIPS 180-4 (NIST: one block, two blocks) and the empty message', () => {
    const examples: [string, string][] = [
      ['abc', 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad'],
      [
        'abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq',
        '248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1',
      ],
      // NIST SHA256ShortMsg, Len = 0.
      ['', 'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855'],
    ];
    for (const [message, digest] of examples) {
      expect(bytesToHex(sha256(utf8ToBytes(message)))).toBe(digest);
    }
  });
});

function sample(): Report {
  const draft = draftOf([PASS, GRAZE, IMPACT]);
  const madeAt = '2040-12-01T00:00:00Z';
  const head = { format: 'skimline-report', version: REPORT_VERSION, madeAt } as const;
  return sealReport({ ...head, ...draft, ...writeFindings(draft) });
}

/** The same data with its keys put in backwards, at every depth. */
function turned<T>(value: T): T {
  if (Array.isArray(value)) return value.map(turned) as T;
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).map(([key, item]) => [key, turned(item)]);
  return Object.fromEntries(entries.reverse()) as T;
}

type Holder = { holder: Record<string, unknown>; key: string };

function numbersIn(value: unknown): Holder[] {
  if (typeof value !== 'object' || value === null) return [];
  const holder = value as Record<string, unknown>;
  return Object.entries(holder).flatMap(([key, item]) =>
    typeof item === 'number' ? [{ holder, key }] : numbersIn(item),
  );
}

describe('the fingerprint', () => {
  it('is what sorting the keys and Node’s own SHA-256 give', () => {
    const { madeAt: _, fingerprint, ...rest } = sample();
    const sorted = JSON.stringify(rest, (_key, value) =>
      typeof value === 'object' && value !== null && !Array.isArray(value)
        ? Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1)))
        : value,
    );
    expect(createHash('sha256').update(sorted, 'utf8').digest('hex')).toBe(fingerprint);
  });

  it('does not hang on the time of making, the order of keys, or itself', () => {
    const report = sample();
    expect(fingerprintOf(report)).toBe(report.fingerprint);
    expect(fingerprintOf(turned(report))).toBe(report.fingerprint);
    expect(fingerprintOf({ ...report, madeAt: '1999-01-01T00:00:00Z' })).toBe(report.fingerprint);
  });

  it('is that of the file read back', () => {
    const text = reportJsonText(sample());
    expect(fingerprintOf(JSON.parse(text))).toBe(sample().fingerprint);
    expect(text.endsWith('}\n')).toBe(true);
  });

  it('changes with the last bit of any number', () => {
    const count = numbersIn(sample()).length;
    const bits = new DataView(new ArrayBuffer(8));
    fc.assert(
      fc.property(fc.nat(count - 1), (index) => {
        const report = sample();
        const { holder, key } = numbersIn(report)[index];
        const value = Number(holder[key]);
        bits.setFloat64(0, value);
        bits.setBigInt64(0, bits.getBigInt64(0) + 1n);
        holder[key] = bits.getFloat64(0);
        expect(holder[key]).not.toBe(value);
        expect(fingerprintOf(report)).not.toBe(report.fingerprint);
        holder[key] = value;
        expect(fingerprintOf(report)).toBe(report.fingerprint);
      }),
    );
  });

  it('changes with any word of a sentence', () => {
    const report = sample();
    report.findings[0].text += ' ';
    expect(fingerprintOf(report)).not.toBe(report.fingerprint);
  });
});

describe('the file', () => {
  it('is not written with a number that is none, where JSON would write null', () => {
    const report = sample();
    report.approaches[1].speedKmS = Number.NaN;
    expect(() => reportJsonText(report)).toThrow('report.approaches[1].speedKmS');
    expect(() => sealReport(report)).toThrow(NonFiniteError);
  });
});
