import { hermiteState } from '../worker/core-geometry';
import { SAMPLE } from '../worker/core-values';
import type { Trajectory } from '../worker/trajectory';
import type { Curve } from './curve';

/** Paths out of the streamed states, as curves over the (fractional) number of the sample. */

export interface TrajectoryCurve extends Curve {
  /** Parameter of an instant, clamped to the curve. */
  parameterAt(tdbSeconds: number): number;
  timeAt(parameter: number): number;
}

/** Which states add up to the path: offset in SAMPLE and sign. */
type PathTerms = readonly (readonly [offset: number, sign: 1 | -1])[];

/** The object about the Earth. */
export const OBJECT_GEOCENTRIC: PathTerms = [[SAMPLE.object, 1]];
/** The object about the Sun. */
export const OBJECT_HELIOCENTRIC: PathTerms = [
  [SAMPLE.earth, 1],
  [SAMPLE.object, 1],
];
/** Two-body motion about the Sun from the epoch, seen from the Sun and from the Earth. */
export const UNPERTURBED_HELIOCENTRIC: PathTerms = [[SAMPLE.unperturbed, 1]];
export const UNPERTURBED_GEOCENTRIC: PathTerms = [
  [SAMPLE.unperturbed, 1],
  [SAMPLE.earth, -1],
];
export const MOON_GEOCENTRIC: PathTerms = [[SAMPLE.moon, 1]];

/** A part spans at most this many samples: they stand dense where the path bends. */
const SAMPLES_A_PART = 24;

const state = new Float64Array(6);

/**
 * @param trajectory  with two samples at least; a later append needs a new curve
 * @param terms       what the path is made of
 * @param window      instants to keep to, TDB seconds; the whole span when left out
 * Accuracy: that of Trajectory.at, whose interpolation this repeats.
 */
export function trajectoryCurve(
  trajectory: Trajectory,
  terms: PathTerms,
  window?: { fromTdbSeconds: number; toTdbSeconds: number },
): TrajectoryCurve {
  const rows = trajectory.samples();
  const last = trajectory.count - 1;
  const parameterAt = (tdbSeconds: number): number => {
    const index = trajectory.indexAt(tdbSeconds);
    const start = rows[index * SAMPLE.stride];
    const share = (tdbSeconds - start) / (rows[(index + 1) * SAMPLE.stride] - start);
    return index + Math.min(1, Math.max(0, share));
  };
  const from = window === undefined ? 0 : parameterAt(window.fromTdbSeconds);
  const to = window === undefined ? last : parameterAt(window.toTdbSeconds);
  return {
    from,
    to,
    parts: Math.max(1, Math.ceil((to - from) / SAMPLES_A_PART)),
    parameterAt: (tdbSeconds) => Math.min(to, Math.max(from, parameterAt(tdbSeconds))),
    timeAt(parameter) {
      const index = Math.min(last - 1, Math.floor(parameter));
      const start = rows[index * SAMPLE.stride];
      return start + (parameter - index) * (rows[(index + 1) * SAMPLE.stride] - start);
    },
    at(parameter, out, at) {
      const index = Math.min(last - 1, Math.floor(parameter));
      const a = index * SAMPLE.stride;
      const b = a + SAMPLE.stride;
      const h = rows[b] - rows[a];
      const share = parameter - index;
      out[at] = 0;
      out[at + 1] = 0;
      out[at + 2] = 0;
      for (const [offset, sign] of terms) {
        hermiteState(rows, a + offset, rows, b + offset, h, share, state, 0);
        out[at] += sign * state[0];
        out[at + 1] += sign * state[1];
        out[at + 2] += sign * state[2];
      }
    },
  };
}
