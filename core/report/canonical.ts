import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import type { Report } from './report';

/** A number that is not finite was about to enter a report. */
export class NonFiniteError extends Error {
  readonly code = 'non-finite';
  override name = 'NonFiniteError';
  constructor(path: string, value: number) {
    super(
      `The figure ${path} came out as ${value}; no report is made with it. The case's state leads where the model cannot follow.`,
    );
  }
}

/**
 * The same with every number to so many significant digits: what exponentials and logarithms of two
 * engines differ by in the last digit is no difference between reports.
 */
export function rounded<T>(value: T, digits = 14): T {
  if (typeof value === 'number') return Number(value.toPrecision(digits)) as T;
  if (Array.isArray(value)) return value.map((item) => rounded(item, digits)) as T;
  if (typeof value === 'object' && value !== null) {
    return Object.fromEntries(
      Object.entries(value).map(([key, item]) => [key, rounded(item, digits)]),
    ) as T;
  }
  return value;
}

/**
 * JSON with sorted keys and no spaces: the form the fingerprint is taken of.
 *
 * @param value plain data; keys whose value is undefined are left out
 * @throws      NonFiniteError naming the path of a NaN or an infinity
 * Numbers are written as ECMAScript writes them: the shortest decimal that reads back the same.
 */
export function canonicalJson(value: unknown, path = 'report'): string {
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new NonFiniteError(path, value);
    return JSON.stringify(value);
  }
  if (Array.isArray(value)) {
    return `[${value.map((item, i) => canonicalJson(item, `${path}[${i}]`)).join(',')}]`;
  }
  if (typeof value === 'object' && value !== null) {
    const members = Object.entries(value)
      .filter(([, item]) => item !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, item]) => `${JSON.stringify(key)}:${canonicalJson(item, `${path}.${key}`)}`);
    return `{${members.join(',')}}`;
  }
  return JSON.stringify(value);
}

/**
 * SHA-256 of the canonical JSON of a report without `madeAt` and `fingerprint`.
 *
 * @param report a report or its draft; one read back from its file gives the same fingerprint
 * @returns      64 hexadecimal digits
 * @throws       NonFiniteError
 * Source: FIPS 180-4 (2015).
 */
export function fingerprintOf(report: Omit<Report, 'fingerprint'>): string {
  const { madeAt: _, ...rest } = report;
  const content = Object.fromEntries(Object.entries(rest).filter(([key]) => key !== 'fingerprint'));
  return bytesToHex(sha256(utf8ToBytes(canonicalJson(content))));
}

/** The draft with its fingerprint; throws NonFiniteError. */
export function sealReport(draft: Omit<Report, 'fingerprint'>): Report {
  return { ...draft, fingerprint: fingerprintOf(draft) };
}

/**
 * The report as the file that is handed over: indented, with a newline at the end.
 *
 * @throws NonFiniteError, where JSON itself would write null
 */
export function reportJsonText(report: Report): string {
  canonicalJson(report);
  return `${JSON.stringify(report, null, 2)}\n`;
}
