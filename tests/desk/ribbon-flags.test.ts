import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { RibbonEvent } from '../../app/ribbon/events';
import {
  type Box,
  type FlagLabel,
  type FlagRoom,
  type Mark,
  placeFlags,
} from '../../app/ribbon/place-flags';

const ROW = 12;
const WIDTH = 900;
const HEIGHT = 120;
/** A V with its foot in the middle, as a pass draws it. */
const V = Float64Array.from([0, 10, WIDTH / 2, HEIGHT - 8, WIDTH, 10]);
const heightAt = (x: number): number =>
  10 + (HEIGHT - 18) * (1 - Math.abs(x - WIDTH / 2) / (WIDTH / 2));

const measure = (text: string): number => text.length * 5.5;
const room: FlagRoom = {
  bounds: { x0: 0, y0: 0, x1: WIDTH, y1: HEIGHT },
  curves: [V],
  rowPx: ROW,
  markPx: 6,
  measure,
};

function mark(x: number, flag: string, direction: 'in' | 'out' | null = null): Mark {
  const event: RibbonEvent = {
    kind: direction === null ? 'approach' : 'crossing',
    tdbSeconds: x,
    utc: '',
    distanceKm: 1,
    body: 'Earth',
    direction,
    label: flag,
    flag,
    shortFlag: flag.slice(0, 3),
    isPrincipal: true,
  };
  return { event, x, y: heightAt(x) };
}

function boxOf(label: FlagLabel): Box {
  const width = measure(label.text);
  const x0 = label.anchor === 'start' ? label.x : label.x - width;
  return { x0, x1: x0 + width, y0: label.y - ROW / 2, y1: label.y + ROW / 2 };
}

const meet = (a: Box, b: Box): boolean => a.x0 < b.x1 && b.x0 < a.x1 && a.y0 < b.y1 && b.y0 < a.y1;

const marks = fc
  .array(
    fc.tuple(fc.double({ min: 0, max: WIDTH, noNaN: true }), fc.integer({ min: 4, max: 22 })),
    { maxLength: 20 },
  )
  .map((list) =>
    list.map(([x, length], i) =>
      mark(x, `${i}${'x'.repeat(length)}`, i % 3 === 0 ? null : i % 3 === 1 ? 'in' : 'out'),
    ),
  );

describe('the flags of the ribbon', () => {
  it('have labels that lie on no other label, on no curve and inside the frame', () => {
    fc.assert(
      fc.property(marks, (list) => {
        const boxes = placeFlags(list, room)
          .map((flag) => flag.label)
          .filter((label) => label !== null)
          .map(boxOf);
        boxes.forEach((box, i) => {
          expect(box.x0 >= 0 && box.x1 <= WIDTH && box.y0 >= 0 && box.y1 <= HEIGHT).toBe(true);
          for (const other of boxes.slice(i + 1)) expect(meet(box, other)).toBe(false);
          for (let x = box.x0; x <= box.x1; x += 0.5) {
            const y = heightAt(x);
            expect(y > box.y0 && y < box.y1).toBe(false);
          }
        });
      }),
      { numRuns: 100 },
    );
  });

  it('have poles that cross no other label', () => {
    fc.assert(
      fc.property(marks, (list) => {
        const flags = placeFlags(list, room);
        for (const flag of flags) {
          if (flag.label === null) continue;
          const pole = {
            x0: flag.x - 0.5,
            x1: flag.x + 0.5,
            y0: Math.min(flag.y, flag.label.y),
            y1: Math.max(flag.y, flag.label.y),
          };
          for (const other of flags) {
            if (other === flag || other.label === null) continue;
            expect(meet(pole, boxOf(other.label))).toBe(false);
          }
        }
      }),
      { numRuns: 100 },
    );
  });

  it('find room for a whole encounter', () => {
    const crossings = ['sphere of influence', 'Moon’s distance', 'geosynchronous', 'low orbits'];
    const away = [190, 155, 60, 25];
    const list = [
      mark(WIDTH / 2, 'Earth 16 240 km'),
      ...crossings.flatMap((words, i) => [
        mark(WIDTH / 2 - away[i], words, 'in'),
        mark(WIDTH / 2 + away[i], words, 'out'),
      ]),
    ];
    const missing = placeFlags(list, room).filter((flag) => flag.label === null);
    expect(missing.map((flag) => flag.event.flag)).toEqual([]);
  });

  it('are labelled once where two with the same words coincide', () => {
    const list = [mark(400, 'geosynchronous', 'in'), mark(401, 'geosynchronous', 'out')];
    expect(placeFlags(list, room).map((flag) => flag.label === null)).toEqual([false, true]);
  });

  it('keep their marks where there is no room for any label', () => {
    const tight = { ...room, bounds: { x0: 0, y0: 0, x1: 10, y1: 10 } };
    const placed = placeFlags([mark(5, 'anything')], tight);
    expect(placed).toHaveLength(1);
    expect(placed[0].label).toBeNull();
  });
});
