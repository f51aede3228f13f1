import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { BODIES, BODY_INDEX } from '../../core/constants';
import {
  createEphemeris,
  EPHEMERIS_COVERAGE,
  type Ephemeris,
  loadEphemeris,
} from '../../core/ephemeris';
import { fetchPacked } from '../helpers/assess';

/** An independent reading of the published package (NumPy); source and script in the data's header. */
const reference: { rows: { mjd: number; bodies: Record<string, [number[], number[]]> }[] } =
  JSON.parse(readFileSync(new URL('data/de405-states.json', import.meta.url), 'utf8'));

describe('the packed ephemeris against an independent reading of the package', () => {
  let ephemeris: Ephemeris;
  beforeAll(async () => {
    ephemeris = createEphemeris();
    const { fromTdbSeconds, toTdbSeconds } = EPHEMERIS_COVERAGE;
    await loadEphemeris(ephemeris, fromTdbSeconds, toTdbSeconds, fetchPacked);
  });

  it('gives the same places and velocities of all bodies on 40 dates from end to end', () => {
    expect(reference.rows).toHaveLength(40);
    const states = new Float64Array(66);
    const positions = new Float64Array(33);
    for (const { mjd, bodies } of reference.rows) {
      const seconds = (mjd - 51544.5) * 86400;
      ephemeris.states(Math.floor(seconds), seconds - Math.floor(seconds), states);
      ephemeris.positions(Math.floor(seconds), seconds - Math.floor(seconds), positions);
      for (const body of BODIES) {
        const [r, v] = bodies[body];
        for (let k = 0; k < 3; k++) {
          const at = BODY_INDEX[body] * 6 + k;
          // Rounding of sums of 1e9 km in another order: some units of 1e-7 km.
          expect(Math.abs(states[at] - r[k])).toBeLessThan(3e-6);
          expect(Math.abs(states[at + 3] - v[k])).toBeLessThan(1e-11);
          expect(positions[BODY_INDEX[body] * 3 + k]).toBe(states[at]);
        }
      }
    }
  });
});
