import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { normaliseCase } from '../../core/case/normalise';
import { BODY_INDEX, SECONDS_PER_DAY } from '../../core/constants';
import { createForceModel, type ForceModel } from '../../core/dynamics/force-model';
import { createPropagator } from '../../core/dynamics/propagate';
import { EncounterScanner } from '../../core/encounter/scan';
import {
  createEphemeris,
  EPHEMERIS_COVERAGE,
  type Ephemeris,
  loadEphemeris,
} from '../../core/ephemeris';
import { caseOf, fetchPacked } from '../helpers/assess';
import { publishedCase, secondsOfJd } from '../helpers/record';
import { median, print } from './print';

/** What the reference library is used for; it ships no declarations of its own. */
interface OdexSolver {
  absoluteTolerance: number;
  relativeTolerance: number;
  maxSteps: number;
  initialStepSize: number;
  solve(
    f: (x: number, y: number[]) => number[],
    x: number,
    y: number[],
    xEnd: number,
  ): { y: number[] };
}

/**
 * The trajectory of the open small-body record from its epoch in 2008 to its pass of 2029: time, and
 * distance from the same trajectory at a quarter of the tolerance. The reference is odex (Hairer's
 * extrapolation method, npm), a general-purpose library, on the same right-hand side.
 */
export async function benchPropagation(): Promise<void> {
  const orbit = publishedCase('2454733.5', '2462241.5');
  const ephemeris = createEphemeris();
  const { fromTdbSeconds, toTdbSeconds } = EPHEMERIS_COVERAGE;
  await loadEphemeris(ephemeris, fromTdbSeconds, toTdbSeconds, fetchPacked);
  const start = normaliseCase(orbit, ephemeris);
  const epoch = start.epochTdbSeconds;
  const end = secondsOfJd('2462240.407032288');
  const state = fromSun(ephemeris, epoch, [...start.positionKm, ...start.velocityKmS]);
  const force = (): ForceModel =>
    createForceModel(ephemeris, {
      gm: 'DE431',
      nonGravitational: { a1: start.a1KmS2, a2: start.a2KmS2, a3: start.a3KmS2 },
    });

  const run = (tolerance: number | undefined, scan: boolean) => {
    const model = force();
    const options = { longestStepS: 40 * 86400, ...(tolerance === undefined ? {} : { tolerance }) };
    const propagator = createPropagator(model, { tdbSeconds: epoch, state }, 1, options);
    const scanner = new EncounterScanner(ephemeris);
    const out = new Float64Array(6);
    let steps = 0;
    let found = 0;
    for (;;) {
      const segment = propagator.step(end);
      steps += 1;
      if (scan) found += scanner.scan(segment).length;
      if (segment.baseSeconds + segment.endOffset >= end) {
        segment.evaluate(segment.endOffset, out);
        return { out, steps, found, evaluations: model.evaluations };
      }
    }
  };
  const truth = run(2.5e-15, false).out;
  const miss = (out: ArrayLike<number>): number =>
    Math.hypot(out[0] - truth[0], out[1] - truth[1], out[2] - truth[2]);

  const { Solver } = createRequire(import.meta.url)('odex') as {
    Solver: new (n: number) => OdexSolver;
  };
  const odex = () => {
    const solver = new Solver(6);
    // Tolerances that bring it to our own accuracy: relative to 1 au and 30 km/s as ours are.
    solver.relativeTolerance = 1e-14;
    solver.absoluteTolerance = 1e-14;
    solver.maxSteps = 1e6;
    solver.initialStepSize = 600;
    const model = force();
    const y = new Float64Array(6);
    const derivative = new Float64Array(6);
    const result = solver.solve(
      (t, values) => {
        y.set(values);
        model.derivative(epoch, t, y, derivative, 0);
        return Array.from(derivative);
      },
      0,
      Array.from(state),
      end - epoch,
    );
    return { out: result.y, evaluations: model.evaluations };
  };

  const plain = median(15, () => run(undefined, false));
  const scanned = median(15, () => run(undefined, true));
  const reference = median(5, odex);
  print('2008 → 2029, trajectory', plain.ms, 'ms', {
    steps: plain.value.steps,
    evaluations: plain.value.evaluations,
    missKm: miss(plain.value.out),
  });
  print('2008 → 2029, with every approach found', scanned.ms, 'ms', {
    events: scanned.value.found,
    target: '50 ms',
  });
  print('the same trajectory by odex', reference.ms, 'ms', {
    evaluations: reference.value.evaluations,
    missKm: miss(reference.value.out),
    ratio: reference.ms / plain.ms,
  });
  benchEncounters(ephemeris);
}

interface Instant {
  mjd_day: number;
  sec_of_day: number;
}

interface Encounter {
  epoch: Instant;
  state_helio_ecl_j2000: { r_km: [number, number, number]; v_km_s: [number, number, number] };
  truth: { time: Instant; geocentric_icrf: { r_km: [number, number, number] } };
}

/** The eight invented encounters of the open set, each from its epoch to its event. */
function benchEncounters(ephemeris: Ephemeris): void {
  const file = new URL('../checks/data/encounters-open.json', import.meta.url);
  const { cases } = JSON.parse(readFileSync(file, 'utf8')) as { cases: Encounter[] };
  const starts = cases.map(({ epoch, state_helio_ecl_j2000, truth }) => {
    const start = normaliseCase(
      caseOf({
        epoch: { scale: 'TDB', mjd: epoch.mjd_day, secondOfDay: epoch.sec_of_day },
        axes: 'EclipticJ2000',
        state: {
          kind: 'cartesian',
          positionKm: state_helio_ecl_j2000.r_km,
          velocityKmS: state_helio_ecl_j2000.v_km_s,
        },
        model: { gm: 'DE405' },
      }),
      ephemeris,
    );
    const tdbSeconds = start.epochTdbSeconds;
    const end = (truth.time.mjd_day - 51544.5) * SECONDS_PER_DAY + truth.time.sec_of_day;
    return {
      tdbSeconds,
      state: fromSun(ephemeris, tdbSeconds, [...start.positionKm, ...start.velocityKmS]),
      end,
      truth: truth.geocentric_icrf.r_km,
    };
  });
  const out = new Float64Array(6);
  const bodies = new Float64Array(33);
  const all = median(15, () => {
    let steps = 0;
    let evaluations = 0;
    let missKm = 0;
    for (const start of starts) {
      const model = createForceModel(ephemeris, { gm: 'DE405', nonGravitational: null });
      const propagator = createPropagator(model, start, 1, { longestStepS: 40 * SECONDS_PER_DAY });
      let segment = propagator.step(start.end);
      for (steps += 1; segment.baseSeconds + segment.endOffset < start.end; steps += 1) {
        segment = propagator.step(start.end);
      }
      segment.evaluate(segment.endOffset, out);
      ephemeris.positions(segment.baseSeconds, segment.endOffset, bodies);
      const earth = BODY_INDEX.Earth * 3;
      const miss = start.truth.map((x, k) => out[k] - bodies[earth + k] - x);
      missKm = Math.max(missKm, Math.hypot(...miss));
      evaluations += model.evaluations;
    }
    return { steps, evaluations, missKm };
  });
  print('eight invented encounters, epoch to event', all.ms, 'ms', all.value);
}

/** A heliocentric state seen from the barycentre. */
function fromSun(ephemeris: Ephemeris, tdbSeconds: number, heliocentric: number[]): Float64Array {
  const base = Math.floor(tdbSeconds);
  const bodies = new Float64Array(66);
  ephemeris.states(base, tdbSeconds - base, bodies);
  const sun = BODY_INDEX.Sun * 6;
  return Float64Array.from(heliocentric, (x, i) => x + bodies[sun + i]);
}
