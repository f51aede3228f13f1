import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { grouped, percentage, plain, unbroken, utcWords, withUnit } from '../../app/desk/figures';
import { NIGHT, PAPER } from '../../app/theme/tokens';

// Expected texts follow the ISO 80000-1 rule (groups of three, thin space) and the calendar.

describe('figures', () => {
  it.each([
    [0, '0\u2009%'],
    [1, '100\u2009%'],
    [0.0019, '0.19\u2009%'],
    [0.372, '37\u2009%'],
    [0.99963, '99.963\u2009%'],
    [3.689e-6, '0.00037\u2009%'],
  ])('the probability %d reads %s: two digits, and never certain when it is not', (value, text) => {
    expect(percentage(value)).toBe(text);
  });

  // Unicode Standard Annex 14: U+2009 is of class BA, a line may end after it; U+202F is GL, "glue".
  it('in running words leave a line no place to end', () => {
    const words = unbroken(`Passes ${withUnit(grouped(16240), 'km')} away`);
    expect(words).toBe('Passes 16\u202f240\u202fkm away');
  });

  it.each([
    [0, 0, '0'],
    [999, 0, '999'],
    [16240, 0, '16\u2009240'],
    [1234567.891, 2, '1\u2009234\u2009567.89'],
    [-38012.4, 0, '\u221238\u2009012'],
    [-0.4, 0, '0'],
    [7.425, 1, '7.4'],
  ])('%d with %d decimals reads %s', (value, decimals, text) => {
    expect(grouped(value, decimals)).toBe(text);
  });

  it('puts a unit after a thin space, a degree sign close up, nothing after a bare number', () => {
    expect(withUnit('5', '°')).toBe('5°');
    expect(withUnit('5', 'km')).toBe('5\u2009km');
    expect(withUnit('5', '')).toBe('5');
  });

  it('keeps every digit of a constant', () => {
    expect(plain(132712440041.9394)).toBe('132712440041.9394');
    expect(plain(-1e-12)).toBe('\u22121e\u221212');
  });
});

describe('UTC in words', () => {
  it.each([
    ['2031-05-14T03:12:40.400Z', '2031 May 14 03:12:40'],
    ['2031-05-14T03:12:40.500Z', '2031 May 14 03:12:41'],
    ['2031-05-14T03:12:59.700Z', '2031 May 14 03:13:00'],
    ['2031-12-31T23:59:59.999Z', '2032 Jan 01 00:00:00'],
    ['2032-02-28T23:59:59.6Z', '2032 Feb 29 00:00:00'],
    ['2016-12-31T23:59:60.700Z', '2016 Dec 31 23:59:60'],
    ['2031-05-14T03:12:40Z', '2031 May 14 03:12:40'],
  ])('%s reads %s', (utc, text) => {
    expect(utcWords(utc)).toBe(text);
  });

  it('leaves a text of another form as it is', () => {
    expect(utcWords('about noon')).toBe('about noon');
  });
});

it('the shell that is painted before the script has the colours of the tokens', () => {
  const css = readFileSync('app/theme/base.css', 'utf8');
  const html = readFileSync('index.html', 'utf8');
  const colours = (text: string, name: string) =>
    [...text.matchAll(new RegExp(`${name}[^#]*(#[0-9a-f]{6})`, 'g'))].map((match) => match[1]);
  expect(colours(css, '--shell-ground:')).toEqual([PAPER.ground, NIGHT.ground]);
  expect(colours(css, '--shell-ink:')).toEqual([PAPER.ink, NIGHT.ink]);
  expect(colours(html, 'name="theme-color" content=')).toEqual([PAPER.ground, NIGHT.ground]);
});
