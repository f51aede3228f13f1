import { spawnSync } from 'node:child_process';
import { DEMOS } from '../../app/desk/demos';
import { readCase } from '../../core/case/read';
import type { OrbitCase } from '../../core/case/types';
import { AU_KM, BODIES, BODY_INDEX, GM_KM3_S2 } from '../../core/constants';
import { type CloneWatch, carryBatch } from '../../core/dynamics/clone-batch';
import { CloneField } from '../../core/dynamics/clone-field';
import { createForceModel } from '../../core/dynamics/force-model';
import { createPropagator } from '../../core/dynamics/propagate';
import { ApproachWatch, type CloneApproach } from '../../core/encounter/clone-watch';
import { EncounterScanner } from '../../core/encounter/scan';
import type { Ephemeris } from '../../core/ephemeris';
import { normalsOf } from '../../core/math/random';
import { assessCase } from '../helpers/assess';
import { type PlannedClones, planClones } from '../helpers/clones';
import { median, middle, print } from './print';

const LEAD_S = 60 * 86400;
const BATCH = 512;
const CHECKED = 40;
/** Clones that SciPy carries as one vector: enough that its own overhead does not count. */
const SCIPY_CLONES = 2048;
const TABLE_STEP_S = 3 * 3600;
const TOLERANCES = [1e-8, 1e-9, 1e-10, 1e-11];
/** Below this the two are called equally good: rounding of the places. */
const LEAST_KM = 1e-4;

/**
 * The first order against the nominal answer alone: the same case assessed with its covariance and
 * without, ten weeks before its pass and the year after it.
 */
export async function benchFirstOrder(): Promise<void> {
  const reading = readCase(DEMOS[0].text, {});
  if (reading.case === null) throw new Error('the case does not read');
  const own = reading.case;
  const time = async (orbit: OrbitCase): Promise<number> => {
    const times: number[] = [];
    for (let i = 0; i < 12; i++) {
      const start = performance.now();
      await assessCase(orbit);
      if (i >= 2) times.push(performance.now() - start);
    }
    return middle(times);
  };
  const nominal = await time({ ...own, covariance: null });
  const both = await time(own);
  print('first order with the nominal answer', both / nominal, 'times the nominal answer alone');
}

const BLIND: CloneWatch = { beginStep() {}, see: () => false };

/**
 * Clones over the last sixty days before an encounter: how many a second on one core, how far the
 * worst is from a tight single integration, and how long SciPy's DOP853 takes for as good an answer
 * (all its clones one vector; point masses only).
 */
export async function benchClones(): Promise<void> {
  const text = DEMOS[0].text;
  const planned = await planClones(text, 80);
  const { plan, ephemeris } = planned;
  const closest = encounterOf(planned);
  const start = closest - LEAD_S;
  const end = closest + 3600;
  const z = new Float64Array(BATCH * plan.dimension);
  normalsOf(7, 0, 0, BATCH, plan.dimension, z);
  const states = new Float64Array(BATCH * 6);
  for (let i = 0; i < BATCH; i++) {
    for (let row = 0; row < 6; row++) {
      let sum = plan.state[row];
      for (let k = 0; k < plan.dimension; k++) {
        sum += plan.factor[row * plan.dimension + k] * z[i * plan.dimension + k];
      }
      states[i * 6 + row] = sum;
    }
  }
  const field = new CloneField(ephemeris, plan.gm, null, {
    fromTdbSeconds: plan.epochTdbSeconds,
    toTdbSeconds: end,
    state: plan.state,
  });
  carryBatch(field, states, null, plan.epochTdbSeconds, start, BLIND);

  const work = new Float64Array(states.length);
  const own = median(60, () => {
    work.set(states);
    const found: CloneApproach[] = [];
    const watch = new ApproachWatch(field, { earth: 0.2 * AU_KM, moon: 2e5 }, (item) =>
      found.push(item),
    );
    carryBatch(field, work, null, start, end, watch);
    return found;
  });
  const { km, s } = worstOf(own.value, states, planned, start, end);
  print('clones over the last 60 days before an encounter', (BATCH / own.ms) * 1000, 'per second', {
    'worst distance from a single integration, km': km,
    'worst time, s': s,
  });

  const answers = scipy(ephemeris, states, plan.gm, start, end);
  if (answers === null) {
    process.stdout.write('SciPy’s DOP853: not measured, python3 with SciPy is not there\n');
    return;
  }
  const good =
    answers.find((item) => item.errorKm <= Math.max(km, LEAST_KM)) ?? answers[answers.length - 1];
  print(
    'SciPy’s DOP853 takes',
    good.seconds / SCIPY_CLONES / (own.ms / 1000 / BATCH),
    'times as long',
    {
      'its clones per second': SCIPY_CLONES / good.seconds,
      'its worst distance, km': good.errorKm,
      'at rtol': good.rtol,
    },
  );
}

function encounterOf({ plan, ephemeris }: PlannedClones): number {
  const propagator = createPropagator(
    createForceModel(ephemeris, { gm: plan.gm, nonGravitational: null }),
    { tdbSeconds: plan.epochTdbSeconds, state: plan.state },
    1,
    { longestStepS: 40 * 86400 },
  );
  const scanner = new EncounterScanner(ephemeris);
  for (;;) {
    const found = scanner
      .scan(propagator.step(plan.toTdbSeconds))
      .find((event) => event.body === 'Earth' && event.kind === 'minimum');
    if (found !== undefined) return found.tdbSeconds;
  }
}

/** The first clones' closest approaches against single integrations of the same states. */
function worstOf(
  found: readonly CloneApproach[],
  states: Float64Array,
  { plan, ephemeris }: PlannedClones,
  start: number,
  end: number,
): { km: number; s: number } {
  let km = 0;
  let s = 0;
  for (let clone = 0; clone < CHECKED; clone++) {
    const own = found.find((item) => item.clone === clone && item.body === BODY_INDEX.Earth);
    const propagator = createPropagator(
      createForceModel(ephemeris, { gm: plan.gm, nonGravitational: null }),
      { tdbSeconds: start, state: states.slice(clone * 6, clone * 6 + 6) },
      1,
      { longestStepS: 40 * 86400 },
    );
    const scanner = new EncounterScanner(ephemeris);
    for (let reached = start; reached < end; ) {
      const segment = propagator.step(end);
      reached = segment.baseSeconds + segment.endOffset;
      for (const event of scanner.scan(segment)) {
        if (event.body !== 'Earth' || event.kind !== 'minimum') continue;
        const closest = own?.closest ?? null;
        if (closest === null) throw new Error(`clone ${clone} has no closest approach`);
        const d = Math.hypot(closest.state[0], closest.state[1], closest.state[2]);
        km = Math.max(km, Math.abs(d - event.distanceKm));
        s = Math.max(s, Math.abs(closest.tdbSeconds - event.tdbSeconds));
      }
    }
  }
  return { km, s };
}

interface ScipyAnswer {
  rtol: number;
  seconds: number;
  errorKm: number;
}

function scipy(
  ephemeris: Ephemeris,
  states: Float64Array,
  gm: 'DE405' | 'DE431',
  start: number,
  end: number,
): ScipyAnswer[] | null {
  const times: number[] = [];
  const places: number[][] = [];
  const velocities: number[][] = [];
  const bodies = new Float64Array(66);
  for (let t = start; t <= end + TABLE_STEP_S; t += TABLE_STEP_S) {
    ephemeris.states(Math.floor(t), t - Math.floor(t), bodies);
    times.push(t - start);
    places.push(BODIES.flatMap((_, b) => Array.from(bodies.subarray(b * 6, b * 6 + 3))));
    velocities.push(BODIES.flatMap((_, b) => Array.from(bodies.subarray(b * 6 + 3, b * 6 + 6))));
  }
  const clones = Array.from({ length: SCIPY_CLONES }, (_, i) =>
    Array.from(states.subarray((i % BATCH) * 6, (i % BATCH) * 6 + 6)),
  );
  const run = spawnSync('/usr/bin/python3', [new URL('./clones.py', import.meta.url).pathname], {
    input: JSON.stringify({
      gm: BODIES.map((body) => GM_KM3_S2[gm][body]),
      times,
      places,
      velocities,
      states: clones,
      end: end - start,
      tolerances: TOLERANCES,
    }),
    encoding: 'utf8',
    maxBuffer: 1e8,
  });
  return run.status === 0 ? (JSON.parse(run.stdout) as ScipyAnswer[]) : null;
}
