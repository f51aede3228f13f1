/** Finds what looks like an instant in a line; what it says is read by the room of time. */

export interface EpochCandidate {
  text: string;
  at: number;
  length: number;
}

const SCALE = String.raw`(?:\s*\(?(?:UTC|UT[012]?|TDB|TDT|TT|TAI|GPS|ET|GMT|TCB|TCG)\b\)?)?`;
const CLOCK = String.raw`(?:(?:T|\s+|,\s*|\s+at\s+)\d{1,2}:\d{2}(?::\d{2}(?:[.,]\d+)?)?(?:Z|[+-]\d{2}:?\d{2}(?![\d.]))?)?`;
const MONTH = String.raw`(?:jan|feb|mar|apr|may|jun|jul|aug|sep|oct|nov|dec)[a-z]*\.?`;
const ERA = String.raw`(?:A\.?\s?D\.?\s*)?`;

/** Decimals; behind a comma only where the comma cannot part a list. */
const DECIMALS = String.raw`(?:\.\d+|,\d+(?![\d.,]))`;

/** From the most telling to the least. */
const PATTERNS: readonly RegExp[] = [
  // 2031-05-12T03:04:05.678Z, 2031-05-12.5, 2031-132T00:00:00
  String.raw`(?<![\d.])${ERA}\d{4}-\d{2}-\d{2}(?:\.\d+|${CLOCK})Z?${SCALE}`,
  String.raw`(?<![\d.])\d{4}-\d{3}T\d{2}:\d{2}(?::\d{2}(?:[.,]\d+)?)?Z?${SCALE}`,
  // 2031 May 12.5, 2031-May-12 03:04:05
  String.raw`(?<![\d.])${ERA}\d{4}[\s\-/]*${MONTH}[\s\-/]*\d{1,2}(?:${DECIMALS}|${CLOCK})?Z?${SCALE}`,
  // 12 May 2031 03:04, May 12, 2031
  String.raw`(?<![\d.])\d{1,2}(?:\.\d+)?[\s\-/]*${MONTH}[\s\-/,]*\d{4}${CLOCK}Z?${SCALE}`,
  String.raw`(?<![\p{L}])${MONTH}\s+\d{1,2}(?:\.\d+)?,?\s+\d{4}${CLOCK}Z?${SCALE}`,
  // JD 2463000.5 TDB, JDTDB 2463000.5, MJD 63000.5
  String.raw`(?<![\p{L}\d.])M?JD[E]?\s?(?:TDB|TT|UTC|TAI|UT1)?\s*[=:]?\s*\d{5,7}${DECIMALS}?${SCALE}`,
  String.raw`(?<![\d.,+\-\u2212])24\d{5}${DECIMALS}?(?![\d])${SCALE}(?:\s*\(?M?JD(?:TDB|TT)?\)?)?`,
  // 05/12/2031, 12.05.2031, 2031/05/12
  String.raw`(?<![\d.])\d{1,2}[/.]\d{1,2}[/.]\d{4}${CLOCK}Z?${SCALE}`,
  String.raw`(?<![\d.])\d{4}/\d{1,2}/\d{1,2}(?:\.\d+|${CLOCK})?Z?${SCALE}`,
  // 2031 05 12.5, 2031 5 12.5
  String.raw`(?<![\d.])(?:19|20)\d{2}\s+(?:0[1-9]|1[0-2])\s+(?:0[1-9]|[12]\d|3[01])(?:\.\d+|${CLOCK})?(?![\d.])Z?${SCALE}`,
  String.raw`(?<![\d.])(?:19|20)\d{2}\s+(?:[1-9]|1[0-2])\s+(?:[1-9]|[12]\d|3[01])\.\d+(?![\d.])${SCALE}`,
].map((source) => new RegExp(source, 'giu'));

/** Candidates in a line, in order of place; none overlaps another. */
export function findEpochs(line: string): EpochCandidate[] {
  const found: EpochCandidate[] = [];
  for (const pattern of PATTERNS) {
    for (const match of line.matchAll(pattern)) {
      const at = match.index;
      const length = match[0].length;
      if (found.some((item) => at < item.at + item.length && item.at < at + length)) continue;
      found.push({ text: match[0].trim(), at, length });
    }
  }
  return found.sort((a, b) => a.at - b.at);
}
