import { describe, expect, it } from 'vitest';
import { axesOf, type Camera, focalPx } from '../../app/stage/camera';
import { LineBuffer, type Stroke } from '../../app/stage/line-buffer';
import { Pen } from '../../app/stage/pen';
import { Projector } from '../../app/stage/projection';
import { add, dot, scale, type Vec3 } from '../../core/math/vector';

const WIDTH = 640;
const HEIGHT = 400;
/** The eye sees a mark jump by about half a pixel. */
const VISIBLE_PX = 0.5;
const STROKE: Stroke = { colour: [0, 0, 0], alpha: 1, widthPx: 2, dash: null };

/** The object one astronomical unit from the scene's centre, at 30 km/s, clock about 2031. */
const START: Vec3 = [1.1e8, -0.9e8, 0.4e8];
const VELOCITY: Vec3 = [17.3, -22.1, 10.7];
const CLOCK_S = 9.9e8;

const place = (seconds: number): Vec3 => add(START, scale(VELOCITY, seconds));

/** Middle of the first drawn end of a line, as the graphics get it (single precision). */
function firstPoint(lines: LineBuffer): [number, number] {
  const drawn = lines.mesh.geometry.getAttribute('position').array;
  return [(drawn[0] + drawn[3]) / 2, (drawn[1] + drawn[4]) / 2];
}

/** Draws a line that starts at a point of the scene, the camera on the object. */
function drawn(from: Vec3, along: Vec3, camera: Camera): [number, number] {
  const lines = new LineBuffer();
  lines.begin(WIDTH, HEIGHT, 1);
  new Pen(lines, new Projector(camera, WIDTH, HEIGHT), []).segmentLine(
    from,
    add(from, along),
    STROKE,
  );
  return firstPoint(lines);
}

/** Largest jump against where the point belongs, over 60 ms of the clock. */
function worstJump(distanceKm: number, spoil: (x: number) => number): number {
  const look = { longitudeRad: 0.7, latitudeRad: 0.5, distanceKm };
  const axes = axesOf({ target: START, ...look });
  // A landmark that rests in space a little beside the object, within the picture.
  const offset = add(scale(axes.right, 0.1 * distanceKm), scale(axes.up, 0.05 * distanceKm));
  const landmark = add(START, offset);
  const focal = focalPx(WIDTH, HEIGHT);
  let worst = 0;
  for (let ms = 0; ms < 60; ms++) {
    const seconds = CLOCK_S + ms / 1000 - CLOCK_S;
    const camera = { target: place(seconds), ...look };
    const spoiled = landmark.map(spoil) as unknown as Vec3;
    const [x, y] = drawn(spoiled, scale(axes.right, 0.1 * distanceKm), camera);
    // The same from small numbers only: offset and way since the start.
    const beside = add(offset, scale(VELOCITY, -seconds));
    const depth = distanceKm + dot(beside, axes.forward);
    const wantedX = WIDTH / 2 + (focal * dot(beside, axes.right)) / depth;
    const wantedY = HEIGHT / 2 - (focal * dot(beside, axes.up)) / depth;
    // Left of the picture the line is cut: what is not seen does not count.
    if (wantedX < 0 || wantedX > WIDTH || wantedY < 0 || wantedY > HEIGHT) continue;
    worst = Math.max(worst, Math.hypot(x - wantedX, y - wantedY));
  }
  return worst;
}

describe('a point beside an object 1 au away, while the clock moves by milliseconds', () => {
  for (const distanceKm of [1, 10, 1e3, 1e5, 1e7, 1.5e8, 4.5e9]) {
    it(`does not jump by half a pixel, seen from ${distanceKm} km`, () => {
      expect(worstJump(distanceKm, (x) => x)).toBeLessThan(VISIBLE_PX);
    });
  }

  it('would jump if places were kept in single precision: the check can fail', () => {
    expect(worstJump(1, Math.fround)).toBeGreaterThan(VISIBLE_PX);
  });
});

describe('a line far beyond the picture', () => {
  it('is cut to its surroundings before it reaches single precision', () => {
    const lines = new LineBuffer();
    lines.begin(WIDTH, HEIGHT, 1);
    const camera = { target: START, longitudeRad: 0.7, latitudeRad: 0.5, distanceKm: 1 };
    const pen = new Pen(lines, new Projector(camera, WIDTH, HEIGHT), []);
    const { right } = axesOf(camera);
    pen.segmentLine(add(START, scale(right, -1e9)), add(START, scale(right, 1e9)), STROKE);
    expect(lines.count).toBe(4);
    const xy = lines.mesh.geometry.getAttribute('position').array;
    for (let i = 0; i < lines.count; i += 2) {
      const [x, y] = [(xy[3 * i] + xy[3 * i + 3]) / 2, (xy[3 * i + 1] + xy[3 * i + 4]) / 2];
      expect(Math.abs(x - WIDTH / 2)).toBeLessThan(WIDTH / 2 + 12);
      // A straight line through the middle stays there: rounding over 1e9 km, seen from 1 km.
      expect(Math.abs(y - HEIGHT / 2)).toBeLessThan(0.01);
    }
  });
});
