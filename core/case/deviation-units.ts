import { AU_KM, SECONDS_PER_DAY } from '../constants';

/** Units of standard deviations in free text. */

export type DeviationKind = 'length' | 'speed' | 'angle' | 'time';

interface DeviationUnit {
  kind: DeviationKind;
  /** One of it in km, km/s, degrees or days. */
  size: number;
}

const UNITS: Readonly<Record<string, DeviationUnit>> = {
  'km/s': { kind: 'speed', size: 1 },
  'm/s': { kind: 'speed', size: 1e-3 },
  'cm/s': { kind: 'speed', size: 1e-5 },
  'mm/s': { kind: 'speed', size: 1e-6 },
  'km/d': { kind: 'speed', size: 1 / SECONDS_PER_DAY },
  'au/d': { kind: 'speed', size: AU_KM / SECONDS_PER_DAY },
  km: { kind: 'length', size: 1 },
  Mkm: { kind: 'length', size: 1e6 },
  au: { kind: 'length', size: AU_KM },
  m: { kind: 'length', size: 1e-3 },
  cm: { kind: 'length', size: 1e-5 },
  mm: { kind: 'length', size: 1e-6 },
  deg: { kind: 'angle', size: 1 },
  rad: { kind: 'angle', size: 180 / Math.PI },
  arcsec: { kind: 'angle', size: 1 / 3600 },
  d: { kind: 'time', size: 1 },
  s: { kind: 'time', size: 1 / SECONDS_PER_DAY },
};

/** Any of them as written; nothing of a longer word. */
export const UNIT_WORD = String.raw`(?:[kK][mM]\s?\/\s?(?:s|d)(?:ec|ay)?|[aA][uU]\s?\/\s?d(?:ay)?|[cm]?m\s?\/\s?s(?:ec)?|[kK][mM]|[aA][uU]|Mkm|[cm]?m|deg(?:rees?)?|°|rad(?:ians?)?|arcsec(?:onds?)?|″|d(?:ays?)?|s)(?![\p{L}\d\/^²])`;

/** The unit that a word stands for, by the name used here. */
export function unitNamed(word: string): string {
  const text = word.replace(/\s/g, '');
  if (text === 'Mkm') return text;
  const plain = text
    .toLowerCase()
    .replace(/\/sec$/, '/s')
    .replace(/\/day$/, '/d');
  if (/^(?:deg|°)/.test(plain)) return 'deg';
  if (plain.startsWith('rad')) return 'rad';
  if (/^(?:arcsec|″)/.test(plain)) return 'arcsec';
  return /^days?$/.test(plain) ? 'd' : plain;
}

export const deviationUnit = (name: string): DeviationUnit | null =>
  Object.hasOwn(UNITS, name) ? UNITS[name] : null;
