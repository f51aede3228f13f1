import { deviationUnit, UNIT_WORD, unitNamed } from './deviation-units';
import { LABELS } from './labels';
import type { Line } from './line';
import { NUMBER_TOKEN, type NumberFormat, readToken } from './number-format';
import { type RawCase, type RawDeviation, remark } from './raw';
import type { FieldName } from './types';

/** Standard deviations in free text: "σ 500 km, 5 cm/s", six in a row, or ± behind each value. */

const POSITION: readonly FieldName[] = ['x', 'y', 'z'];
const VELOCITY: readonly FieldName[] = ['vx', 'vy', 'vz'];
const STATE: readonly FieldName[] = [...POSITION, ...VELOCITY];

const NUMBER = NUMBER_TOKEN.source;
/** "3-sigma", or "3 sigma" at the head of a line: how many σ the numbers are. */
const TIMES = String.raw`(?<![\p{L}\d.])[1-9](?:-?|(?<=^\W*[1-9])\s)(?=σ|sigma)`;
const SIGMA = String.raw`(?:${TIMES})?(?<!\p{L})(?:σ(?!\p{L}{3})|(?:SIGMA|[sS]igmas?|[sS]\.?[dD]\.?|STD|UNCERTAINT(?:Y|IES)|[sS]td\.?(?:[\s-]?dev\w*\.?)?|[sS]tandard deviations?|[uU]ncertaint(?:y|ies))(?=[\s_:=()\[",]|$))`;
const HEAD = String.raw`${SIGMA}(?:[\s(),]*${SIGMA})*`;
/** "σx 120 km", "sigma_vx = 1e-6". */
const NAMED = new RegExp(
  String.raw`(${HEAD})[\s_(]*(v?[xyz]|[xyz]_?dot|e|q|a|tp|M|node|peri|i|A[123])\)?\s*[:=]?\s*(${NUMBER})\s*(${UNIT_WORD})?`,
  'gu',
);
const BETWEEN = String.raw`[\s,;:=±()\[\]/"|]|\+\/-|(?<!\p{L})(?:and|in|each|per|axis|position|pos|velocity|vel)(?!\p{L})|[1-9][\s-]?(?:σ|sigma)(?!\p{L})`;
/** A word for the three of position or of velocity. */
const GROUP = String.raw`(?:[\s_(]*(r|pos(?:ition)?|v|vel(?:ocity)?)(?![\p{L}\d]))?`;
const LISTED = new RegExp(
  String.raw`(${HEAD}|(?<![\p{L}\d])(?:±|\+\/-))${GROUP}((?:${BETWEEN}|${NUMBER}|${UNIT_WORD})*)`,
  'gu',
);
const PLUS_MINUS = new RegExp(String.raw`(?:±|\+\/-|\+-)\s*(${NUMBER})(\s*(${UNIT_WORD}))?`, 'gu');
const VALUE_AT_END = new RegExp(String.raw`${NUMBER}\s*(${UNIT_WORD})?\s*$`, 'u');

const VALUE_ALONE = new RegExp(String.raw`^\s*${NUMBER}\s*(?:${UNIT_WORD})?\s*$`, 'u');

const ELEMENT_NAMES: Readonly<Record<string, FieldName>> = {
  e: 'eccentricity',
  q: 'periapsisDistance',
  a: 'semiMajorAxis',
  tp: 'periapsisTime',
  M: 'meanAnomaly',
  node: 'node',
  peri: 'argumentOfPeriapsis',
  i: 'inclination',
  A1: 'a1',
  A2: 'a2',
  A3: 'a3',
};

const COUNT_OF_SIGMA = /([1-9])[\s-]?(?:σ|sigma)/g;
const timesOf = (text: string): number => Number([...text.matchAll(COUNT_OF_SIGMA)][0]?.[1] ?? 1);

/** Whether a line holds numbers and units alone. */
const isRow = (text: string): boolean =>
  /\d/.test(text) &&
  [NUMBER, UNIT_WORD, BETWEEN]
    .reduce((left, part) => left.replace(new RegExp(part, 'gu'), ' '), text)
    .trim() === '';

interface Item {
  text: string;
  unit: string | null;
}

/** Takes what says how sure the values are, before anything else is read; nothing of it is lost. */
export function takeDeviations(lines: Line[], raw: RawCase, format: NumberFormat): void {
  for (const [i, line] of lines.entries()) {
    if (!/[±σΣ]|\+\/?-|sigma|\bs\.?d\b|\bstd|deviation|uncertaint/i.test(line.text)) continue;
    takeNamed(line, raw, format);
    takeBehind(line, raw, format);
    takeListed(lines, i, raw, format);
  }
  matchRows(raw);
}

function keep(raw: RawCase, field: FieldName, given: RawDeviation): void {
  const before = raw.deviations.get(field);
  if (before !== undefined && (before.text !== given.text || before.unit !== given.unit)) {
    raw.problems.push(
      remark(
        'error',
        given.line,
        'covariance',
        given.text,
        `σ of ${field}: ${given.text} here, ${before.text} on line ${before.line}. Leave one of the two.`,
      ),
    );
    return;
  }
  raw.deviations.set(field, given);
}

function unread(raw: RawCase, line: number, text: string): void {
  const read = text.trim();
  const message = `Uncertainties are not used: “${read}” is not six standard deviations, three, or one of position and one of velocity.`;
  raw.problems.push(remark('warning', line, 'uncertainty', read, message));
}

function takeNamed(line: Line, raw: RawCase, format: NumberFormat): void {
  line.text = line.text.replace(
    NAMED,
    (whole: string, head: string, name: string, token: string, unit) => {
      const numbers = readToken(token, format);
      if (numbers?.length !== 1) return whole;
      const axis = name.replace(/^([xyz])_?dot$/, 'v$1');
      const field = STATE.find((item) => item === axis) ?? ELEMENT_NAMES[name];
      keep(raw, field, {
        text: numbers[0],
        unit: typeof unit === 'string' ? unitNamed(unit) : null,
        times: timesOf(head),
        line: line.number,
      });
      return ' ; ';
    },
  );
}

/** "x = 1.2e8 ± 40 km": the unit behind is that of both, unless the value has its own. */
function takeBehind(line: Line, raw: RawCase, format: NumberFormat): void {
  const { text } = line;
  let out = '';
  let from = 0;
  let last = 0;
  for (const match of text.matchAll(PLUS_MINUS)) {
    // What stands behind another ± is no value.
    const value = VALUE_AT_END.exec(text.slice(last, match.index));
    last = match.index + match[0].length;
    const before = text.slice(from, match.index);
    const numbers = readToken(match[1], format);
    if (value === null || numbers?.length !== 1) continue;
    const unit = match[3] === undefined ? null : unitNamed(match[3]);
    const own = value[1] === undefined ? null : unitNamed(value[1]);
    const given = { text: numbers[0], unit: unit ?? own, times: 1, line: line.number };
    const field = labelBefore(text, from, match.index);
    if (field === null) raw.deviationRow.push({ ...given, velocity: /^\W*v/i.test(text) });
    else keep(raw, field, given);
    const isOfValue = own === null && unit !== null && !/^[cm]m|^arcsec|^d$|^s$/.test(unit);
    out += `${before} ${isOfValue ? (match[2] ?? '') : ' '}`;
    from = match.index + match[0].length;
  }
  line.text = out + text.slice(from);
}

/** The field whose label stands before the value that ends at a place; null when none does. */
function labelBefore(text: string, from: number, to: number): FieldName | null {
  let best: { field: FieldName; at: number } | null = null;
  for (const { field, kind, pattern } of LABELS) {
    if (field === null) continue;
    for (const match of text.matchAll(pattern)) {
      const end = match.index + match[0].length;
      if (match.index < from || end > to || (best !== null && match.index <= best.at)) continue;
      const between = text.slice(end, to);
      const isOwn = kind === 'epoch' ? between.length < 50 : VALUE_ALONE.test(between);
      if (isOwn) best = { field, at: match.index };
    }
  }
  return best?.field ?? null;
}

function itemsOf(text: string, format: NumberFormat): Item[] | null {
  const items: Item[] = [];
  const plain = text.replace(COUNT_OF_SIGMA, ' ');
  for (const match of plain.matchAll(new RegExp(`(${NUMBER})|(${UNIT_WORD})`, 'gu'))) {
    if (match[1] === undefined) {
      const unit = unitNamed(match[0]);
      for (const item of items) item.unit ??= unit;
      continue;
    }
    const numbers = readToken(match[1], format);
    if (numbers === null) return null;
    items.push(...numbers.map((number) => ({ text: number, unit: null })));
  }
  return items;
}

function takeListed(lines: Line[], at: number, raw: RawCase, format: NumberFormat): void {
  const line = lines[at];
  line.text = line.text.replace(LISTED, (whole: string, _head, group, list: string) => {
    let items = itemsOf(list, format);
    if (items === null || items.length === 0) {
      // A head alone on its line: what it is the head of stands below.
      const isAlone = line.text.trim() === whole.trim() && whole.trim() !== '';
      if (!isAlone) return whole;
      const below: Line[] = [];
      let text = list;
      for (const next of lines.slice(at + 1)) {
        if (!isRow(next.text)) break;
        text += ` ; ${next.text}`;
        below.push(next);
        items = itemsOf(text, format);
        if ((items?.length ?? 0) >= 6) break;
      }
      if (items?.length !== 6) return whole;
      for (const next of below) next.text = '';
    }
    if (!spread(raw, items, typeof group === 'string' ? group : '', timesOf(whole), line)) {
      unread(raw, line.number, whole);
    }
    return ' ; ';
  });
}

const kindOf = (item: Item): string | null =>
  item.unit === null ? null : (deviationUnit(item.unit)?.kind ?? null);

/** Gives the numbers of a list to the components; false when it is none of the known kinds. */
function spread(raw: RawCase, items: Item[], group: string, times: number, line: Line): boolean {
  const ofVelocity = group.toLowerCase().startsWith('v');
  const halves: Item[][] =
    items.length === 6
      ? [items.slice(0, 3), items.slice(3)]
      : items.length === 2
        ? items.map((item) => [item, item, item])
        : items.length === 3
          ? [items]
          : items.length === 1
            ? [[items[0], items[0], items[0]]]
            : [];
  const kinds = halves.map((half, i) => {
    const said = new Set(half.map(kindOf));
    if (said.size > 1) return 'mixed';
    const kind = kindOf(half[0]);
    if (kind !== null) return kind;
    if (halves.length === 2) return i === 0 ? 'length' : 'speed';
    return group === '' ? 'unknown' : ofVelocity ? 'speed' : 'length';
  });
  const isKnown =
    halves.length > 0 &&
    kinds.every((kind) => kind === 'length' || kind === 'speed') &&
    new Set(kinds).size === kinds.length;
  if (!isKnown) return false;
  for (const [i, half] of halves.entries()) {
    const fields = kinds[i] === 'length' ? POSITION : VELOCITY;
    for (const [j, field] of fields.entries()) {
      keep(raw, field, { ...half[j], times, line: line.number });
    }
  }
  return true;
}

/** ± behind each of six numbers without labels: in their order. */
function matchRows(raw: RawCase): void {
  const row = raw.deviationRow;
  if (row.length === 0) return;
  if (row.length !== 6) {
    unread(raw, row[0].line, row.map(({ text }) => `± ${text}`).join(', '));
    return;
  }
  const velocityFirst = row.slice(0, 3).every((item) => item.velocity) && !row[3].velocity;
  const ordered = velocityFirst ? [...row.slice(3), ...row.slice(0, 3)] : row;
  for (const [i, field] of STATE.entries()) {
    const { text, unit, times, line } = ordered[i];
    keep(raw, field, { text, unit, times, line });
  }
}
