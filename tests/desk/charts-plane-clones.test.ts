import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cloneFigures, clonesByDistance, nearestClone } from '../../app/charts/plane-pick';
import { cloneStamps, printClones, wiped } from '../../app/charts/plane-stamp';
import { CloneCloud } from '../../app/worker/clone-cloud';

/** 100 km a pixel, the body's centre at 50, 50. */
const PROJECT = { x0: 50, xT: 0.01, xR: 0, y0: 50, yT: 0, yR: 0.01 };

/** Clone, B·T, B·R, later, distance, speed, outcome. */
type Row = [number, number, number, number, number, number, number];

function cloud(plain: Row[], rare: Row[] = []): CloneCloud {
  const made = new CloneCloud();
  made.append('plain', Float32Array.from(plain.flat()));
  made.append('rare', Float32Array.from(rare.flat()));
  return made;
}

const at = (t: number, r: number, outcome = 0): Row => [1, t, r, 0, Math.hypot(t, r), 10, outcome];

function picture() {
  const made = { widthPx: 100, heightPx: 80, data: new Uint8ClampedArray(4 * 100 * 80) };
  wiped(made, '#b02f16');
  return made;
}

const alphaAt = ({ data }: ReturnType<typeof picture>, x: number, y: number): number =>
  data[4 * (y * 100 + x) + 3];

function inked(made: ReturnType<typeof picture>): string[] {
  const all: string[] = [];
  for (let y = 0; y < 80; y++) {
    for (let x = 0; x < 100; x++) if (alphaAt(made, x, y) > 0) all.push(`${x - 60},${y - 40}`);
  }
  return all;
}

describe('the nearest clone', () => {
  it('is the one that a search of all finds, within reach', () => {
    const place = fc.double({ min: -5000, max: 5000, noNaN: true });
    const rows = fc.array(fc.tuple(place, place), { minLength: 1, maxLength: 30 });
    const px = fc.double({ min: 0, max: 100, noNaN: true });
    fc.assert(
      fc.property(rows, rows, px, px, (plain, rare, x, y) => {
        const made = cloud(
          plain.map(([t, r]) => at(t, r)),
          rare.map(([t, r]) => at(t, r)),
        );
        const away = [...plain, ...rare].map(([t, r]) =>
          Math.hypot(50 + Math.fround(t) / 100 - x, 50 + Math.fround(r) / 100 - y),
        );
        const found = nearestClone(made, PROJECT, x, y, 9);
        const least = Math.min(...away);
        expect(found === null).toBe(least > 9);
        if (found === null) return;
        const points = made.points(found.drawn);
        const [t, r] = [points[found.at + 1], points[found.at + 2]];
        expect(Math.hypot(50 + t / 100 - x, 50 + r / 100 - y)).toBeCloseTo(least, 9);
      }),
    );
  });

  it('is never one without a place on the plane', () => {
    const made = cloud([at(Number.NaN, Number.NaN), at(100, 0)]);
    expect(nearestClone(made, PROJECT, 50, 50, 9)).toEqual({ drawn: 'plain', at: 7 });
    expect(clonesByDistance(made)).toEqual([{ drawn: 'plain', at: 7 }]);
  });

  it('comes first when clones are stepped through, of both sets', () => {
    const made = cloud([at(3000, 0), at(500, 0)], [at(0, 1000), at(0, -100)]);
    expect(clonesByDistance(made).map(({ drawn, at }) => `${drawn} ${at / 7}`)).toEqual([
      'rare 1',
      'plain 1',
      'rare 0',
      'plain 0',
    ]);
  });
});

describe('a clone’s figures', () => {
  const made = cloud([[12345, 2000, 1000, -45, 1500.4, 12.3456, 2]], [[7, 0, 0, 3600, 1, 1, 0]]);
  const plain = (text: string) => text.replaceAll('\u2009', ' ').replaceAll('\u2212', '-');

  it('are told on T and R', () => {
    const told = cloneFigures(made, { drawn: 'plain', at: 0 }, 'tr', 0);
    expect(plain(told.title)).toBe('Clone 12 345');
    expect(told.outcome).toBe('hits');
    expect(told.rows.map((row) => plain(row.join(' ')))).toEqual([
      'B·T 2 000 km',
      'B·R 1 000 km',
      'distance 1 500 km',
      'time 45 s earlier',
      'speed 12.346 km/s',
    ]);
  });

  it('are turned to ξ and ζ, ζ upwards', () => {
    // A quarter turn clockwise: T goes down, so ζ is −T; R goes to the left, so ξ is −R.
    const { rows } = cloneFigures(made, { drawn: 'plain', at: 0 }, 'xi-zeta', Math.PI / 2);
    expect(rows.slice(0, 2).map((row) => plain(row.join(' ')))).toEqual([
      'ξ -1 000 km',
      'ζ -2 000 km',
    ]);
  });

  it('say that a clone is of the rare-event sample', () => {
    const told = cloneFigures(made, { drawn: 'rare', at: 0 }, 'tr', 0);
    expect(told.title).toBe('Clone 7 of the rare-event sample');
    expect(told.outcome).toBe('passes');
  });
});

describe('the marks of clones', () => {
  const stamps = cloneStamps(1);
  // On the pixel 60, 40: 1 050 km and −950 km from the centre.
  const one = (outcome: number) => Float32Array.from(at(1050, -950, outcome));

  it('lie on the clone’s pixel, in the colour given', () => {
    const made = picture();
    printClones(made, one(0), stamps.plain, PROJECT);
    expect(alphaAt(made, 60, 40)).toBeGreaterThan(60);
    expect([...made.data.subarray(4 * (40 * 100 + 60), 4 * (40 * 100 + 60) + 3)]).toEqual([
      0xb0, 0x2f, 0x16,
    ]);
  });

  it('differ in shape between a pass and an impact, and between the two sets', () => {
    const shapes = (['plain', 'rare'] as const).flatMap((drawn) =>
      [0, 2].map((outcome) => {
        const made = picture();
        printClones(made, one(outcome), stamps[drawn], PROJECT);
        return inked(made).join(' ');
      }),
    );
    expect(new Set(shapes).size).toBe(4);
    // A saltire reaches into its corners; an upright cross does not.
    expect(shapes[1]).toContain('3,3');
    expect(shapes[3]).not.toContain('3,3');
    // A ring is open in the middle.
    expect(shapes[2].split(' ')).not.toContain('0,0');
  });

  it('darken where they lie over one another', () => {
    const made = picture();
    printClones(made, one(0), stamps.plain, PROJECT);
    const once = alphaAt(made, 60, 40);
    printClones(made, one(0), stamps.plain, PROJECT);
    expect(alphaAt(made, 60, 40)).toBeGreaterThan(once);
    expect(alphaAt(made, 60, 40)).toBeLessThan(255);
  });

  it('stay within the picture, and leave out what has no place on it', () => {
    const made = picture();
    const rows = [at(-5000, -5000, 2), at(1e6, 0, 2), at(Number.NaN, 0, 2)];
    printClones(made, Float32Array.from(rows.flat()), stamps.plain, PROJECT);
    const all = inked(made).map((place) => place.split(',').map(Number));
    expect(all.length).toBeGreaterThan(0);
    // Only the corner has a quarter of a mark.
    expect(all.every(([x, y]) => x + 60 <= 4 && y + 40 <= 4)).toBe(true);
  });
});
