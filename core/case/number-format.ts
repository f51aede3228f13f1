import { tidyNumber } from './raw';

/**
 * How numbers are written in a text: with a decimal point (commas group digits or part a list) or
 * with a decimal comma (points group digits).
 */
export type NumberFormat = 'point' | 'comma';

/** A run of digits with points and commas between them, a sign and an exponent. */
export const NUMBER_TOKEN =
  /(?:(?<![\p{L}_])[+\-\u2212\u2013]|(?<![\p{L}\d_]|\p{L}[-\u2212]))(?:\d[\d.,\u2009\u202f\u00a0'’_]*|[.,]\d+)(?:[eEdD][+\-\u2212]?\d+)?(?![\p{L}\d_])/gu;

/** By thousands, or by lakhs and crores (12,34,567). */
const GROUPED_BY_COMMAS =
  /^[+-]?[1-9](?:\d{0,2}(?:,\d{3})+|\d?(?:,\d{2})+,\d{3})(?:\.\d*)?(?:e[+-]?\d+)?$/i;
const GROUPED_BY_POINTS = /^[+-]?[1-9]\d{0,2}(?:\.\d{3})+(?:,\d*)?(?:e[+-]?\d+)?$/i;
const WITH_POINT = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i;
const WITH_COMMA = /^[+-]?(?:\d+,?\d*|,\d+)(?:e[+-]?\d+)?$/i;

/**
 * The numbers that a token stands for in a format, in plain form; null when it cannot be read so.
 * With a decimal point a token may be a list: "1.5,2.5,3.5".
 */
export function readToken(token: string, format: NumberFormat): string[] | null {
  const text = tidyNumber(token).replace(/[.,]+$/, (tail) => (tail === '.' ? '.' : ''));
  if (format === 'point') {
    if (GROUPED_BY_COMMAS.test(text)) return [text.replaceAll(',', '')];
    const parts = text.split(',').filter((part) => part !== '');
    return parts.length > 0 && parts.every((part) => WITH_POINT.test(part)) ? parts : null;
  }
  if (GROUPED_BY_POINTS.test(text)) return [text.replaceAll('.', '').replace(',', '.')];
  return WITH_COMMA.test(text) ? [text.replace(',', '.')] : null;
}

/**
 * Whether the numbers of a text could have decimal commas: a comma between digits, or points that
 * can only group. Commas followed by a blank part a list.
 */
export function mayBeDecimalComma(text: string): boolean {
  return /\d,\d|\d\.\d{3}\.\d{3}(?!\d)/.test(text);
}
