import { type Line, takeAll } from './line';
import { problem, type RawCase } from './raw';
import type { FieldName } from './types';
import { AXES, CENTRES, known, lookUp, SCALES, type Word } from './vocabulary';

/** The words of a free text that tell centre, axes, time scale and units. */

const SPEED_WORD =
  /(?<![\p{L}])(km\s?\/\s?s(?:ec)?|au\s?\/\s?d(?:ay)?|m\s?\/\s?s|km\s?\/\s?d(?:ay)?|km\s?s\^?-1|au\s?d(?:ay)?\^?-1)(?![\p{L}\d])/giu;
const LENGTH_WORD = /(?<![\p{L}/])(million km|[kK][mM]|[aA][uU]|[mM]km|m)(?![\p{L}\d/^²])/gu;
/** Units of a whole table in one word: "Output units: KM-S". */
const UNIT_PAIR = /(?<![\p{L}\d])(km|au|m)-(s|d)(?![\p{L}\d])/giu;

const BODY = 'sun|earth|moon|mercury|venus|mars|jupiter|saturn|uranus|neptune|pluto|ceres';
/** What says that the name behind it is the origin of the state. */
const CENTRE_HEAD = String.raw`(?:\bcent(?:er|re|ral)(?:[\s_-]body)?(?:[\s_-]?name)?|\borigin|\brelative to|\bwith respect to|\bw\.?r\.?t\.?|\babout|\baround)\s*[:=]?\s*`;
const BODY_CODE = String.raw`(?:\s*[([]\s*\d{1,3}\s*[)\]])?`;
const NAMED_CENTRE = new RegExp(String.raw`${CENTRE_HEAD}(?:the\s+)?(${BODY})\b${BODY_CODE}`, 'gi');
const CENTRED = new RegExp(String.raw`\b(${BODY})[\s-]+cent(?:er|re)(?:d|red|ed)?\b`, 'gi');
const OTHER_CENTRED = /\b(?:areo|zeno|jovi|krono|hermo|aphrodi|uranio?|posei?do?)cent?ric\b/gi;

/** Axes that are known and not carried. */
const OTHER_AXES =
  /\b(?:ECEF|ITRF(?:[-\s]?\d{2,4})?|ITRS|TEME|TOD|MOD|PEF|WGS\s?-?84|FK4|B1950(?:\.0)?|(?:body|earth)[\s-]fixed|galactic)\b/g;
const OF_DATE =
  /\b(?:equator|ecliptic|equinox|axes)(?: and (?:equator|ecliptic|equinox))? of date\b/gi;
const OTHER_SCALES = /\b(?:UT[012]|TCB|TCG)\b/g;

interface Said {
  value: string;
  line: number;
  word: string;
}

type Say = (field: FieldName, value: string, line: number, word: string) => void;

/** Words that tell centre, axes, time scale and units. */
export function takeWords(lines: Line[], raw: RawCase): void {
  const said = new Map<FieldName, Said[]>();
  const say: Say = (field, value, line, word) => {
    said.set(field, [...(said.get(field) ?? []), { value, line, word: word.trim() }]);
  };
  for (const line of lines) {
    takeAxes(line, raw, say);
    takeCentre(line, raw, say);
    takeScale(line, raw, say);
    takeUnits(line, say);
  }
  for (const [field, list] of said) settle(field, list, raw);
}

function refuse(
  raw: RawCase,
  line: Line,
  field: FieldName,
  read: string,
  words: readonly Word<unknown>[],
  advice = '',
): void {
  raw.problems.push(
    problem('error', line.number, field, read.trim(), `one of ${known(words)}`, advice),
  );
}

function takeAxes(line: Line, raw: RawCase, say: Say): void {
  const all = (pattern: RegExp, value: string): void =>
    takeAll(line, pattern, (match) => say('axes', value, line.number, match[0]));
  const advice = 'Earth-fixed axes and axes of date are not read; turn the state to J2000 first.';
  takeAll(line, OF_DATE, (match) => refuse(raw, line, 'axes', match[0], AXES, advice));
  takeAll(line, OTHER_AXES, (match) => refuse(raw, line, 'axes', match[0], AXES, advice));
  all(/\becliptic and (?:mean )?equinox of j2000(?:\.0)?\b/gi, 'EclipticJ2000');
  all(/\becliptic (?:of |x-y plane[^\n]{0,40}of )j2000(?:\.0)?\b/gi, 'EclipticJ2000');
  all(/\b(?:ECLIPJ2000|ecliptic(?:[\s-]*j2000(?:\.0)?)?|eclip)\b/gi, 'EclipticJ2000');
  all(
    /\b(?:earth (?:mean )?equator and equinox of j2000|mean equator of j2000)(?:\.0)?\b/gi,
    'ICRF',
  );
  all(/\b(?:ICRF[23]?|ICRS|GCRF|EME2000|equatorial)\b/gi, 'ICRF');
  takeAll(line, /\bJ2000(?:\.0)?\b/g);
  takeAll(line, /\b(?:reference\s+)?(?:frame|axes)\s*[:=]\s*(\p{L}[\p{L}\d-]*)/giu, (match) =>
    refuse(raw, line, 'axes', match[1], AXES),
  );
}

function takeCentre(line: Line, raw: RawCase, say: Say): void {
  const body = (name: string, word: string): void => {
    const found = lookUp(CENTRES, name);
    if (found === null) refuse(raw, line, 'centre', word, CENTRES);
    else say('centre', found.value, line.number, word);
  };
  takeAll(
    line,
    new RegExp(
      String.raw`(?:\bearth[\s-]*moon[\s-]*baryc\w+|\bEMB\b|\bearth baryc\w+)${BODY_CODE}`,
      'gi',
    ),
    (match) => say('centre', 'EarthBarycentre', line.number, match[0]),
  );
  takeAll(
    line,
    new RegExp(
      String.raw`(?:\bsolar[\s-]*system[\s-]*baryc\w+|\bSSB\b|\bbarycent(?:ric|er|re)\b)${BODY_CODE}`,
      'gi',
    ),
    (match) => say('centre', 'SSB', line.number, match[0]),
  );
  takeAll(line, /\b(?:heliocentric|geocentric|selenocentric)\b/gi, (match) =>
    body(match[0], match[0]),
  );
  takeAll(line, OTHER_CENTRED, (match) => refuse(raw, line, 'centre', match[0], CENTRES));
  takeAll(line, /\bECI\b/g, (match) => say('centre', 'Earth', line.number, match[0]));
  takeAll(line, CENTRED, (match) => body(match[1], match[0]));
  takeAll(line, NAMED_CENTRE, (match) => body(match[1], match[0]));
  takeAll(
    line,
    /\bcent(?:er|re|ral)(?:[\s_-]body)?(?:[\s_-]?name)?\s*[:=]\s*(\p{L}[\p{L}\d-]*)/giu,
    (match) => refuse(raw, line, 'centre', match[1], CENTRES),
  );
}

function takeScale(line: Line, raw: RawCase, say: Say): void {
  takeAll(line, OTHER_SCALES, (match) => refuse(raw, line, 'timeScale', match[0], SCALES));
  takeAll(line, /(?<=JD)(?:TDB|TT|UTC|TAI)\b/g, (match) =>
    say('timeScale', match[0], line.number, match[0]),
  );
  // In small letters only where no other word is written so.
  takeAll(line, /\b(?:(?:TDB|UTC|TAI|GPS|tdb|utc|tai|gps)|TT|UT|TDT|ET|GMT)\b/g, (match) => {
    const found = lookUp(SCALES, match[0]);
    if (found !== null) say('timeScale', found.value, line.number, match[0]);
  });
  takeAll(line, /\btime (?:scale|system)\s*[:=]\s*(\p{L}[\p{L}\d-]*)/giu, (match) =>
    refuse(raw, line, 'timeScale', match[1], SCALES),
  );
}

function takeUnits(line: Line, say: Say): void {
  takeAll(line, UNIT_PAIR, (match) => {
    const length = match[1].toLowerCase();
    say('lengthUnit', length, line.number, match[0]);
    say('speedUnit', `${length}/${match[2].toLowerCase()}`, line.number, match[0]);
  });
  takeAll(line, SPEED_WORD, (match) => say('speedUnit', unitOf(match[0]), line.number, match[0]));
  takeAll(line, LENGTH_WORD, (match) => say('lengthUnit', unitOf(match[0]), line.number, match[0]));
}

function unitOf(word: string): string {
  const text = word.toLowerCase().replace(/\s/g, '');
  if (text.startsWith('au') && text.length > 2) return 'au/d';
  if (/^km(?:\/s|s\^?-1)/.test(text)) return 'km/s';
  if (/^km\/d/.test(text)) return 'km/d';
  if (text === 'millionkm' || text === 'mkm') return 'Mkm';
  return text;
}

/** One word for a field is read; two that differ are asked about. */
function settle(field: FieldName, list: Said[], raw: RawCase): void {
  const before = raw.fields.get(field);
  const all =
    before === undefined
      ? list
      : [{ value: before.text, line: before.line ?? list[0].line, word: before.text }, ...list];
  const first = all[0];
  const values = [...new Set(all.map((item) => item.value))];
  raw.fields.set(field, { text: first.value, unit: null, line: first.line, note: null });
  if (values.length > 1) {
    const words = [...new Set(all.map((item) => `“${item.word}”`))];
    raw.questions.push({
      field,
      line: all.find((item) => item.value !== first.value)?.line ?? first.line,
      message: `The text says ${words.join(' and ')}. Which is meant?`,
      readings: values.map((value) => ({ value, label: value })),
    });
  }
}
