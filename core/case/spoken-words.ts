import type { Line } from './line';
import { problem, type RawCase } from './raw';
import type { FieldName } from './types';
import { AXES, CENTRES, lookUp, SCALES } from './vocabulary';

/** The words of a free text that tell centre, axes, time scale and units. */

const SPEED_WORD =
  /(?<![\p{L}])(km\s?\/\s?s(?:ec)?|au\s?\/\s?d(?:ay)?|m\s?\/\s?s|km\s?\/\s?d(?:ay)?|km\s?s\^?-1|au\s?d(?:ay)?\^?-1)(?![\p{L}\d])/giu;
const LENGTH_WORD = /(?<![\p{L}/])(million km|[kK][mM]|[aA][uU]|[mM]km|m)(?![\p{L}\d/^²])/gu;

/** Words that tell centre, axes, time scale and units. */
export function takeWords(lines: Line[], raw: RawCase): void {
  const said = new Map<FieldName, { value: string; line: number; word: string }[]>();
  const say = (field: FieldName, value: string, line: number, word: string): void => {
    said.set(field, [...(said.get(field) ?? []), { value, line, word }]);
  };
  for (const line of lines) {
    const take = (pattern: RegExp, use: (word: string) => void): void => {
      line.text = line.text.replace(pattern, (word) => {
        use(word);
        return ' '.repeat(word.length);
      });
    };
    const speak = (
      pattern: RegExp,
      field: FieldName,
      words: typeof CENTRES | typeof AXES | typeof SCALES,
    ): void =>
      take(pattern, (word) => {
        const found = lookUp<{ value: string; label: string; spoken: string[] }>(
          words,
          word.replace(/[@:]|cent(?:er|re)(?:ed)?\s*=?|-cent(?:ered|red)/gi, ''),
        );
        if (found !== null) say(field, found.value, line.number, word.trim());
      });
    take(/\becliptic and equinox of j2000(?:\.0)?\b/gi, (word) =>
      say('axes', 'EclipticJ2000', line.number, word),
    );
    take(/\b(?:ECLIPJ2000|ecliptic(?:[\s-]*j2000(?:\.0)?)?|eclip)\b/gi, (word) =>
      say('axes', 'EclipticJ2000', line.number, word),
    );
    take(/\b(?:earth equator and equinox of j2000|mean equator of j2000)\b/gi, (word) =>
      say('axes', 'ICRF', line.number, word),
    );
    speak(/\b(?:ICRF[23]?|ICRS|GCRF|EME2000|equatorial)\b/gi, 'axes', AXES);
    take(/\bJ2000(?:\.0)?\b/g, () => {});
    if (/\b(?:true|mean)?\s*(?:equator|ecliptic|equinox)?\s*of date\b/i.test(line.text)) {
      raw.problems.push(
        problem(
          'error',
          line.number,
          'axes',
          line.original.trim(),
          'axes of J2000 (ICRF or EclipticJ2000)',
          'Axes of date are not read; turn the state to J2000 first.',
        ),
      );
    }
    take(/\bearth[\s-]*moon[\s-]*baryc\w+|\bEMB\b|\bearth baryc\w+/gi, (word) =>
      say('centre', 'EarthBarycentre', line.number, word),
    );
    take(/\bsolar[\s-]*system[\s-]*baryc\w+|\bSSB\b|\bbarycent(?:ric|er|re)\b/gi, (word) =>
      say('centre', 'SSB', line.number, word),
    );
    speak(/\b(?:heliocentric|geocentric|selenocentric)\b/gi, 'centre', CENTRES);
    take(/\b(sun|earth|moon)[\s-]+cent(?:er|re)(?:d|red|ed)?\b/gi, (word) =>
      sayBody(word, line.number),
    );
    take(
      /\b(?:cent(?:er|re)(?:_?name)?|origin|relative to|about|around)\s*[:=]?\s*(?:the\s+)?(sun|earth|moon)\b/gi,
      (word) => sayBody(word, line.number),
    );
    take(/(?<=JD|MJD)(?:TDB|TT|UTC|TAI)\b/g, (word) => say('timeScale', word, line.number, word));
    speak(/\b(?:TDB|TT|TAI|UTC|UT|GPS|TDT|ET)\b/g, 'timeScale', SCALES);
    take(SPEED_WORD, (word) => say('speedUnit', unitWord(word), line.number, word));
    take(LENGTH_WORD, (word) => say('lengthUnit', unitWord(word), line.number, word));
  }
  function sayBody(word: string, line: number): void {
    const body = /sun|earth|moon/i.exec(word)?.[0].toLowerCase() ?? 'sun';
    say('centre', body === 'sun' ? 'Sun' : body === 'earth' ? 'Earth' : 'Moon', line, word.trim());
  }
  for (const [field, list] of said) settle(field, list, raw);
}

function unitWord(word: string): string {
  const text = word.toLowerCase().replace(/\s/g, '');
  if (text.startsWith('au') && text.length > 2) return 'au/d';
  if (/^km(?:\/s|s\^?-1)/.test(text)) return 'km/s';
  if (/^km\/d/.test(text)) return 'km/d';
  if (text === 'm/s') return 'm/s';
  if (text === 'millionkm' || text === 'mkm') return 'Mkm';
  return text;
}

/** One word for a field is read; two that differ are asked about. */
function settle(
  field: FieldName,
  list: { value: string; line: number; word: string }[],
  raw: RawCase,
): void {
  const first = list[0];
  // Units stand beside labelled values too; a field that a label has set already is not asked about.
  const values = [...new Set(list.map((item) => item.value))];
  if (field === 'lengthUnit' && raw.fields.has('diameter') && values.length > 1) return;
  raw.fields.set(field, { text: first.value, unit: null, line: first.line, note: null });
  if (values.length > 1) {
    raw.questions.push({
      field,
      line: list.find((item) => item.value !== first.value)?.line ?? first.line,
      message: `The text says ${list.map((item) => `“${item.word.trim()}”`).join(' and ')}. Which is meant?`,
      readings: values.map((value) => ({ value, label: value })),
    });
  }
}
