import { DEG_TO_RAD } from '../constants';
import { meanFromTrueAnomaly, meanMotion } from '../orbit/kepler';
import { tdbSecondsFromEpoch } from '../time/convert';
import type { Epoch } from '../time/epoch';
import { gmOfCentre } from './centre-gm';
import type { Fielding } from './fielding';
import { plainNumber, problem } from './raw';
import type { Centre, FieldName, OrbitPhase } from './types';

/** Where on its orbit the object is: time of periapsis, mean anomaly or true anomaly. */

/** Longest time between the epoch and periapsis, years: an anomaly is meant by anything longer. */
const MOST_YEARS = 500;
/** Difference of two given places, degrees of mean anomaly, that rounding of the text explains. */
const AGREE_DEG = 0.02;

const PHASES = ['periapsisTime', 'meanAnomaly', 'trueAnomaly'] as const;

/** The place on the orbit: what was set by hand, else the first that is given; null with problems. */
export function readPhase(f: Fielding, e: number | null, epoch: Epoch | null): OrbitPhase | null {
  const given = PHASES.filter((field) => f.has(field));
  const used = given.find((field) => f.isEdited(field)) ?? given[0];
  switch (used) {
    case 'periapsisTime':
      return readPeriapsisTime(f, epoch);
    case 'meanAnomaly': {
      const meanAnomalyDeg = f.number(used, 'mean anomaly', '°', { from: -1e6, to: 1e6 });
      return meanAnomalyDeg === null ? null : { kind: 'mean-anomaly', meanAnomalyDeg };
    }
    case 'trueAnomaly':
      return readTrueAnomaly(f, e);
    default:
      f.problems.push(
        problem(
          'error',
          null,
          'place on the orbit',
          '',
          'a mean anomaly M, a true anomaly, or a time of periapsis',
        ),
      );
      return null;
  }
}

function readPeriapsisTime(f: Fielding, epoch: Epoch | null): OrbitPhase | null {
  const time = f.raw('periapsisTime');
  if (time === null) return null;
  f.show('periapsisTime', 'time of periapsis', time.text, null);
  const reading = f.epochReading('periapsisTime', time);
  if (reading === null) return null;
  const scale = reading.scale ?? epoch?.scale ?? 'TDB';
  const periapsisEpoch: Epoch = { scale, mjd: reading.mjd, secondOfDay: reading.secondOfDay };
  const years = epoch === null ? 0 : (epoch.mjd - periapsisEpoch.mjd) / 365.25;
  if (Math.abs(years) > MOST_YEARS) {
    f.problems.push(
      problem(
        'error',
        time.line,
        'time of periapsis',
        time.text,
        `an instant within ${MOST_YEARS} years of the epoch`,
      ),
    );
    return null;
  }
  return { kind: 'periapsis-time', periapsisEpoch };
}

function readTrueAnomaly(f: Fielding, e: number | null): OrbitPhase | null {
  const trueAnomalyDeg = f.number('trueAnomaly', 'true anomaly', '°', { from: -360, to: 360 });
  if (trueAnomalyDeg === null) return null;
  if (e !== null && 1 + e * Math.cos(trueAnomalyDeg * DEG_TO_RAD) <= 0) {
    const raw = f.raw('trueAnomaly');
    f.problems.push(
      problem(
        'error',
        raw?.line ?? null,
        'true anomaly',
        raw?.text ?? '',
        `an angle inside the asymptotes for an eccentricity of ${e}`,
      ),
    );
    return null;
  }
  return { kind: 'true-anomaly', trueAnomalyDeg };
}

/** The size and the centre of an orbit, as far as places on it depend on them. */
interface Shape {
  periapsisKm: number;
  eccentricity: number;
  centre: Centre;
  epoch: Epoch | null;
}

/** Where a text gives more than one of the three they must name one place. */
export function checkPhases(f: Fielding, used: OrbitPhase, shape: Shape): void {
  if (PHASES.some((field) => f.isEdited(field))) return;
  const first = meanOf(f, used, shape);
  const others: [FieldName, string, OrbitPhase['kind']][] = [
    ['meanAnomaly', 'mean anomaly', 'mean-anomaly'],
    ['trueAnomaly', 'true anomaly', 'true-anomaly'],
  ];
  for (const [field, label, kind] of others) {
    const raw = f.raw(field);
    if (kind === used.kind || raw === null || !f.has(field)) continue;
    const value = plainNumber(raw.text);
    const phase: OrbitPhase =
      kind === 'mean-anomaly'
        ? { kind, meanAnomalyDeg: value ?? Number.NaN }
        : { kind: 'true-anomaly', trueAnomalyDeg: value ?? Number.NaN };
    const second = meanOf(f, phase, shape);
    if (first === null || second === null) continue;
    const turn = shape.eccentricity < 1 ? 360 : Number.POSITIVE_INFINITY;
    const apart = Math.abs(first - second) % turn;
    const differenceDeg = Math.min(apart, turn - apart);
    f.show(field, label, raw.text, '°', 'given as well; not used');
    if (differenceDeg <= AGREE_DEG) continue;
    f.problems.push(
      problem(
        'error',
        raw.line,
        label,
        raw.text,
        `the same place as the ${used.kind.replaceAll('-', ' ')} names`,
        `They are ${differenceDeg.toPrecision(3)}° of mean anomaly apart; leave one of the two out.`,
      ),
    );
  }
}

/** Mean anomaly of a place, degrees; null where there is none to compare. */
function meanOf(f: Fielding, phase: OrbitPhase, shape: Shape): number | null {
  const { eccentricity: e, periapsisKm, centre, epoch } = shape;
  // For a parabola what a text calls its mean anomaly is not agreed on.
  if (e === 1) return null;
  if (phase.kind === 'mean-anomaly') {
    return Number.isNaN(phase.meanAnomalyDeg) ? null : phase.meanAnomalyDeg;
  }
  if (phase.kind === 'true-anomaly') {
    const nu = phase.trueAnomalyDeg * DEG_TO_RAD;
    if (!(1 + e * Math.cos(nu) > 0)) return null;
    const wrapped = Math.atan2(Math.sin(nu), Math.cos(nu));
    return meanFromTrueAnomaly(wrapped, e) / DEG_TO_RAD;
  }
  if (epoch === null) return null;
  const set = f.textOf('gm') === 'DE405' ? 'DE405' : 'DE431';
  const seconds = tdbSecondsFromEpoch(epoch) - tdbSecondsFromEpoch(phase.periapsisEpoch);
  return (meanMotion(periapsisKm, e, gmOfCentre(centre, set)) * seconds) / DEG_TO_RAD;
}
