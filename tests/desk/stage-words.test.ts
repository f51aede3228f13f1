import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { distance, offset, pictured, place } from '../../app/stage/figures';
import { type Label, overlaps, placeLabels } from '../../app/stage/labels';
import { tickOffsets, tickStep } from '../../app/stage/path-ticks';
import { PixelRatio } from '../../app/stage/pixel-ratio';
import { readingsOf } from '../../app/stage/readings';
import { roundDown, scaleBar } from '../../app/stage/scale-bar';
import { AU_KM } from '../../core/constants';
import { SAMPLE } from '../../core/dynamics/sample-layout';

const plain = (text: string) => text.replace(/[\u2009\u00a0]/g, ' ');

const PICTURE = { widthPx: 400, heightPx: 300 };
const measure = ({ text }: Label) => 6 * text.length;

const label = fc
  .record({
    x: fc.double({ min: 0, max: 400, noNaN: true }),
    y: fc.double({ min: 0, max: 300, noNaN: true }),
    length: fc.integer({ min: 1, max: 24 }),
    priority: fc.integer({ min: 0, max: 100 }),
  })
  .map(({ x, y, length, priority }) => ({ x, y, text: 'x'.repeat(length), priority }));

function asLabels(entries: { x: number; y: number; text: string; priority: number }[]): Label[] {
  return entries.map((entry, i) => ({
    ...entry,
    id: String(i),
    gap: 5,
    style: 'note',
    colour: [0, 0, 0],
  }));
}

describe('the lettering', () => {
  it('never crosses itself, what must stay free, or the edge', () => {
    fc.assert(
      fc.property(fc.array(label, { maxLength: 25 }), (entries) => {
        const taken = [{ left: 100, right: 200, top: 80, bottom: 140 }];
        const placed = placeLabels(asLabels(entries), taken, PICTURE, measure, new Map());
        const boxes = [...taken, ...placed.map(({ box }) => box)];
        for (const [i, a] of boxes.entries()) {
          expect(a.left >= 0 && a.top >= 0 && a.right <= 400 && a.bottom <= 300).toBe(true);
          for (const b of boxes.slice(i + 1)) expect(overlaps(a, b)).toBe(false);
        }
      }),
    );
  });

  it('leaves out the less important of two labels that have room for one', () => {
    const narrow = { widthPx: 70, heightPx: 30 };
    const entries = asLabels([
      { x: 5, y: 15, text: 'minor', priority: 1 },
      { x: 5, y: 15, text: 'major', priority: 9 },
    ]);
    const placed = placeLabels(entries, [], narrow, measure, new Map());
    expect(placed.map(({ text }) => text)).toEqual(['major']);
  });

  it('keeps a label on its side while that side is free', () => {
    const memory = new Map<string, number>();
    const at = (x: number) => asLabels([{ x, y: 150, text: 'object', priority: 1 }]);
    const block = [{ left: 205, right: 300, top: 100, bottom: 200 }];
    const [pushed] = placeLabels(at(200), block, PICTURE, measure, memory);
    expect(pushed.box.right).toBeLessThan(200);
    const [kept] = placeLabels(at(200), [], PICTURE, measure, memory);
    expect(kept.box).toEqual(pushed.box);
  });
});

describe('the figures of the scenes', () => {
  it('write lengths in km when near and in au when far', () => {
    expect(plain(distance(16240.4))).toBe('16 240 km');
    expect(plain(distance(6378.1))).toBe('6 378 km');
    expect(plain(distance(42.19))).toBe('42.2 km');
    expect(plain(distance(1.5 * AU_KM))).toBe('1.5000 au');
  });

  it('write a distance in Earth radii or lunar distances', () => {
    // 42 164 km / 6 378.137 km = 6.6107; 768 800 km is twice 384 400 km.
    expect(plain(pictured(42164))).toBe('6.61 Earth radii');
    expect(plain(pictured(768800))).toBe('2.00 lunar distances');
  });

  it('write a place with its hemispheres', () => {
    expect(place(-33.8678, 151.2073)).toBe('33.87° S 151.21° E');
    expect(place(0.5, -78.456)).toBe('0.50° N 78.46° W');
  });

  it('write times from the pass in the unit they are counted in', () => {
    expect(plain(offset(-4200, 600))).toBe('−70 min');
    expect(plain(offset(5400, 1800))).toBe('+1.5 h');
    expect(plain(offset(-2592000, 864000))).toBe('−30 d');
    expect(plain(offset(155_520_000, 31_104_000))).toBe('+1 800 d');
  });
});

describe('the read-out', () => {
  const sample = new Float64Array(SAMPLE.stride);
  // Two Earth radii above the equator, on the prime meridian when the rotation angle is zero.
  sample.set([3 * 6378.137, 0, 0, 0, 6, 8], SAMPLE.object);
  sample.set([AU_KM, 0, 0, 0, 30, 0], SAMPLE.earth);

  it('of the Earth scene gives distance, altitude, speed and the ground beneath', () => {
    expect(readingsOf('earth', sample).map(({ text }) => plain(text))).toEqual([
      '19 134 km',
      '3.00 Earth radii',
      '12 756 km',
      '10.00 km/s',
      '0.00° N 0.00° E',
    ]);
  });

  it('of the Sun scene gives both distances and the heliocentric speed', () => {
    // |(0, 36, 8)| = 36.878 km/s; (1 au + 19 134 km) / 1 au = 1.00013.
    expect(readingsOf('sun', sample).map(({ text }) => plain(text))).toEqual([
      '1.0001 au',
      '19 134 km',
      '36.88 km/s',
    ]);
  });
});

describe('the scale bar', () => {
  it('has a length of 1, 2 or 5 times a power of ten that fits and fills two fifths of its room', () => {
    fc.assert(
      fc.property(fc.double({ min: -3, max: 8, noNaN: true }), (log) => {
        const kmPerPx = 10 ** log;
        const bar = scaleBar(kmPerPx, 100);
        expect(bar.lengthPx).toBeLessThanOrEqual(100 + 1e-9);
        expect(bar.lengthPx).toBeGreaterThan(39.9);
        expect(bar.lengthKm / (bar.lengthPx * kmPerPx)).toBeCloseTo(1, 12);
        const round = bar.text.endsWith('au') ? bar.lengthKm / AU_KM : bar.lengthKm;
        const lead = round / 10 ** Math.floor(Math.log10(round) + 1e-9);
        expect([1, 2, 5].some((each) => Math.abs(lead - each) < 1e-6)).toBe(true);
        expect(Number.parseFloat(bar.text.replace(/\u2009/g, ''))).toBeCloseTo(round, 6);
      }),
    );
  });

  it('says the same length in Earth radii where that helps', () => {
    // 20 000 / 6 378.137 = 3.136.
    expect(plain(scaleBar(250, 100).text)).toBe('20 000 km');
    expect(plain(scaleBar(250, 100).radii ?? '')).toBe('3.1 Earth radii');
    expect(scaleBar(1, 100).radii).toBeNull();
  });

  it('rounds down', () => {
    expect([0.99, 1, 4.9, 5, 0.02, 730].map(roundDown)).toEqual([0.5, 1, 2, 5, 0.02, 500]);
  });
});

describe('the marks along a path', () => {
  it('are no more than asked for and all within the stretch, without the pass itself', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e8, max: 1e8, noNaN: true }),
        fc.double({ min: 60, max: 1e8, noNaN: true }),
        (from, length) => {
          const step = tickStep(length, 8);
          const offsets = tickOffsets(from, from + length, step);
          expect(offsets.length).toBeLessThanOrEqual(9);
          for (const seconds of offsets) {
            expect(seconds >= from && seconds <= from + length && seconds !== 0).toBe(true);
          }
        },
      ),
    );
  });
});

describe('the fineness of the picture', () => {
  const run = (ratio: PixelRatio, frameMs: number, frames: number, from: number): number => {
    for (let i = 1; i <= frames; i++) ratio.frame(from + i * frameMs);
    return from + frames * frameMs;
  };

  it('is taken back when frames are slow, and not below three quarters', () => {
    const ratio = new PixelRatio(1);
    run(ratio, 70, 400, 0);
    expect(ratio.value).toBe(0.75);
  });

  it('stays as it is when frames come at 60 a second', () => {
    const ratio = new PixelRatio(2);
    run(ratio, 16.7, 400, 0);
    expect(ratio.value).toBe(2);
  });

  it('does not swing between a fineness that is too slow and one that is not', () => {
    const ratio = new PixelRatio(1);
    const slow = run(ratio, 60, 25, 0);
    expect(ratio.value).toBeLessThan(1);
    run(ratio, 16.7, 500, slow);
    expect(ratio.value).toBeLessThan(1);
  });

  it('takes no pause between frames for a slow frame', () => {
    const ratio = new PixelRatio(1);
    run(ratio, 1000, 100, 0);
    expect(ratio.value).toBe(1);
  });
});
