import { SECONDS_PER_DAY } from '../constants';
import { EPHEMERIS_COVERAGE } from '../ephemeris';
import { tdbSecondsFromEpoch } from '../time/convert';
import type { Epoch, TimeScale } from '../time/epoch';
import { checkCovariance } from './covariance-checks';
import { deviationCovariance, tellOddDeviations } from './deviation-covariance';
import { readElements } from './elements';
import { Fielding } from './fielding';
import { problem, type RawCase } from './raw';
import { readState } from './state';
import { checkState } from './state-checks';
import type {
  Choices,
  FieldName,
  NonGravitational,
  OrbitCase,
  Physical,
  ReadResult,
} from './types';
import { AXES, CENTRES, GM_SETS, NUMBER_FORMATS, SCALES } from './vocabulary';

/** The packed ephemeris, as days MJD TDB: what an epoch must lie within. */
const mjdOf = (tdbSeconds: number): number => tdbSeconds / SECONDS_PER_DAY + 51544.5;
const FIRST_MJD = mjdOf(EPHEMERIS_COVERAGE.fromTdbSeconds);
const LAST_MJD = mjdOf(EPHEMERIS_COVERAGE.toTdbSeconds);
const COVERAGE = EPHEMERIS_COVERAGE.text;

const ELEMENT_FIELDS: FieldName[] = [
  'eccentricity',
  'semiMajorAxis',
  'periapsisDistance',
  'inclination',
  'node',
  'argumentOfPeriapsis',
];

/**
 * Makes a case of what a text says and what was set by hand.
 *
 * @param raw     the text, field by field
 * @param choices fields set by hand, over the text
 * @returns       the fields as understood, what is wrong, what is asked, and the case when nothing is
 */
export function interpret(raw: RawCase, choices: Choices): ReadResult {
  const f = new Fielding(raw, choices);
  f.words('name', 'name', 'Unnamed object', 'the text gives no name');
  f.words('objectId', 'designation', null, null);

  const isElements =
    ELEMENT_FIELDS.filter((field) => f.has(field)).length >= 2 && !f.has('x') && !f.has('vx');
  const centre = f.choose(
    'centre',
    'centre',
    CENTRES,
    'Sun',
    'the text does not say; about the Sun is usual',
  );
  const axes = f.choose(
    'axes',
    'axes',
    AXES,
    isElements ? 'EclipticJ2000' : 'ICRF',
    isElements
      ? 'the text does not say; elements are usually on the ecliptic of J2000'
      : 'the text does not say; if it is on the ecliptic of J2000 set it here: the answer changes entirely',
  );
  if (f.has('numberFormat')) {
    f.choose('numberFormat', 'decimal sign', NUMBER_FORMATS, 'point', '');
  }
  const epoch = readEpoch(f);
  const state = isElements ? readElements(f, centre, epoch) : readState(f, centre);
  const gm = f.choose('gm', 'gravitational parameters', GM_SETS, 'DE431', 'default set');
  const nonGravitational = readForces(f);
  const physical = readPhysical(f);
  const span = readSpan(f, epoch);
  if (raw.covariance !== null) {
    f.show('covariance', 'covariance', covarianceInWords(raw.covariance), null);
  }
  const covariance =
    raw.covariance !== null
      ? checkCovariance(f, raw.covariance)
      : state === null || axes === null
        ? null
        : deviationCovariance(f, raw.deviations, state, axes);
  if (covariance !== null) {
    tellOddDeviations(f, covariance, f.raw('covariance')?.line ?? null);
  }

  // While it is asked how the numbers are written there is no state to judge.
  const isAsked = f.questions.some(({ field }) => field === 'numberFormat');
  if (state?.kind === 'cartesian' && centre !== null && !isAsked) checkState(f, state, centre);

  const blocked = f.questions.length > 0 || f.problems.some((item) => item.severity === 'error');
  const complete =
    centre !== null && axes !== null && epoch !== null && state !== null && gm !== null;
  const orbit: OrbitCase | null =
    blocked || !complete
      ? null
      : {
          name: f.textOf('name') ?? 'Unnamed object',
          objectId: f.textOf('objectId'),
          invented: raw.invented,
          originator: raw.originator,
          epoch,
          centre,
          axes,
          state,
          covariance,
          nonGravitational,
          physical,
          model: { gm },
          span,
        };
  return {
    format: raw.format,
    fields: f.fields,
    problems: f.problems,
    questions: f.questions,
    case: orbit,
  };
}

function covarianceInWords(covariance: NonNullable<OrbitCase['covariance']>): string {
  return covariance.kind === 'cartesian'
    ? `6 × 6, ${covariance.frame}`
    : `${covariance.labels.length} × ${covariance.labels.length}, ${covariance.labels.join(' ')}`;
}

/** The epoch with its scale, within the ephemeris; null with a problem or a question. */
function readEpoch(f: Fielding): Epoch | null {
  const given = f.raw('epoch');
  if (given === null) {
    f.show('epoch', 'epoch', '', null);
    f.problems.push(
      problem(
        'error',
        null,
        'epoch',
        '',
        'the instant of the state, such as 2031-05-12T00:00:00 TDB',
      ),
    );
    f.choose('timeScale', 'time scale', SCALES, 'TDB', 'the text does not say; TDB is usual');
    return null;
  }
  f.show('epoch', 'epoch', given.text, null);
  const reading = f.epochReading('epoch', given);
  if (reading !== null && reading.scale !== null && !f.has('timeScale')) {
    f.set('timeScale', reading.scale, given.line);
  }
  const said = reading?.scale ?? null;
  const scale = f.choose(
    'timeScale',
    'time scale',
    SCALES,
    'TDB',
    'the text does not say; TDB is usual',
  );
  if (reading === null || scale === null) return null;
  if (said !== null && said !== scale && !f.isEdited('timeScale')) {
    f.problems.push(
      problem(
        'error',
        given.line,
        'time scale',
        `${said} beside the epoch, ${scale} elsewhere`,
        'one time scale',
      ),
    );
    return null;
  }
  const epoch: Epoch = { scale, mjd: reading.mjd, secondOfDay: reading.secondOfDay };
  if (epoch.mjd < FIRST_MJD || epoch.mjd >= LAST_MJD) {
    f.problems.push(
      problem(
        'error',
        given.line,
        'epoch',
        given.text,
        `an instant that the ephemeris covers, ${COVERAGE}`,
      ),
    );
    return null;
  }
  return epoch;
}

function readForces(f: Fielding): NonGravitational | null {
  const labels: [FieldName, string][] = [
    ['a1', 'A1, radial'],
    ['a2', 'A2, transverse'],
    ['a3', 'A3, normal'],
  ];
  if (!labels.some(([field]) => f.has(field))) return null;
  const [a1AuD2, a2AuD2, a3AuD2] = labels.map(
    ([field, label]) =>
      f.number(field, label, 'au/d²', { optional: true, from: -1e-3, to: 1e-3 }) ?? 0,
  );
  return { a1AuD2, a2AuD2, a3AuD2 };
}

function readPhysical(f: Fielding): Physical {
  const physical: Physical = {};
  const take = (
    field: FieldName,
    key: keyof Physical,
    label: string,
    unit: string | null,
    from: number,
    to: number,
  ): void => {
    const value = f.number(field, label, unit, { optional: true, from, to });
    if (value !== null) physical[key] = value;
  };
  take('absoluteMagnitude', 'absoluteMagnitude', 'absolute magnitude H', null, -5, 40);
  take('slopeParameter', 'slopeParameter', 'slope parameter G', null, -1, 1);
  take('diameter', 'diameterM', 'diameter', 'm', 1e-3, 1e6);
  take('albedo', 'albedo', 'albedo', null, 1e-3, 1);
  take('density', 'densityKgM3', 'density', 'kg/m³', 10, 2e4);
  take('strength', 'strengthPa', 'strength', 'Pa', 0, 1e10);
  return physical;
}

/** The asked span; null for the default one. */
function readSpan(f: Fielding, epoch: Epoch | null): OrbitCase['span'] {
  const at = (field: 'spanFrom' | 'spanTo', label: string): number | null => {
    const given = f.raw(field);
    f.show(field, label, given?.text ?? '', null, given === null ? 'default' : null);
    if (given === null || given.text.trim() === '') return null;
    const reading = f.epochReading(field, given);
    if (reading === null) return null;
    const scale: TimeScale = reading.scale ?? epoch?.scale ?? 'TDB';
    if (reading.mjd < FIRST_MJD || reading.mjd > LAST_MJD) {
      f.problems.push(
        problem(
          'error',
          given.line,
          label,
          given.text,
          `a date that the ephemeris covers, ${COVERAGE}`,
        ),
      );
      return null;
    }
    return tdbSecondsFromEpoch({ scale, mjd: reading.mjd, secondOfDay: reading.secondOfDay });
  };
  const from = at('spanFrom', 'search from');
  const to = at('spanTo', 'search to');
  if (epoch === null || (from === null && to === null)) return null;
  const middle = tdbSecondsFromEpoch(epoch);
  const { fromTdbSeconds: first, toTdbSeconds: last } = EPHEMERIS_COVERAGE;
  const span = {
    fromTdbSeconds: from ?? Math.max(first, Math.min(middle, to ?? middle) - 30 * SECONDS_PER_DAY),
    toTdbSeconds: to ?? Math.min(last, Math.max(middle, from ?? middle) + 365.25 * SECONDS_PER_DAY),
  };
  if (span.fromTdbSeconds >= span.toTdbSeconds) {
    f.problems.push(
      problem(
        'error',
        null,
        'search to',
        f.raw('spanTo')?.text ?? '',
        'a date after the beginning of the search',
      ),
    );
    return null;
  }
  return span;
}
