import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { shortened, wrapped } from '../../app/plate/text-fit';

/** Letters of unequal width, as in a real face. */
const measure = (text: string): number =>
  Array.from(text).reduce((sum, letter) => sum + (/[il.,]/.test(letter) ? 3 : 7), 0);

const words = fc.array(fc.string({ minLength: 1, maxLength: 14 }), { maxLength: 30 });
const text = words.map((list) => list.join(' '));
/** Never narrower than a letter and an ellipsis. */
const width = fc.integer({ min: 20, max: 300 });

describe('wrapped text', () => {
  it('has no line wider than its room', () => {
    fc.assert(
      fc.property(text, width, (words, room) => {
        for (const line of wrapped(words, room, measure)) {
          expect(measure(line)).toBeLessThanOrEqual(room);
        }
      }),
    );
  });

  it('loses no letter', () => {
    fc.assert(
      fc.property(text, width, (words, room) => {
        const letters = (one: string) => one.replaceAll(' ', '');
        expect(letters(wrapped(words, room, measure).join(''))).toBe(letters(words));
      }),
    );
  });

  it('breaks at blanks and keeps figures with their units together', () => {
    const lines = wrapped('It passes 16\u2009240\u2009km away', 90, measure);
    expect(lines).toEqual(['It passes', '16\u2009240\u2009km', 'away']);
  });

  it('starts a line of its own only where the one before is full', () => {
    fc.assert(
      fc.property(text, width, (words, room) => {
        const lines = wrapped(words, room, measure);
        lines.slice(1).forEach((line, i) => {
          const [first] = line.split(' ');
          expect(measure(`${lines[i]} ${first}`)).toBeGreaterThan(room);
        });
      }),
    );
  });
});

describe('shortened text', () => {
  it('fits, and stays whole where there is room', () => {
    fc.assert(
      fc.property(text, width, (words, room) => {
        const short = shortened(words, room, measure);
        expect(measure(short)).toBeLessThanOrEqual(room);
        if (measure(words) <= room) expect(short).toBe(words);
        else expect(short.endsWith('…')).toBe(true);
      }),
    );
  });

  it('keeps as much of the start as there is room for', () => {
    // Seven units a letter: five letters and the ellipsis are 42.
    expect(shortened('abcdefghjk', 42, measure)).toBe('abcde…');
    expect(shortened('abcdefghjk', 70, measure)).toBe('abcdefghjk');
  });
});
