import { describe, expect, it } from 'vitest';
import { createCarrierHandler } from '../../app/worker/carrier-handler';
import type {
  CarrierPort,
  CarrierRequest,
  CarrierResponse,
} from '../../app/worker/carrier-messages';
import { CarrierDied, createCarrierPool } from '../../app/worker/pool';
import { WorkerError } from '../../app/worker/wire-error';
import type { CloneOutcomes, ClonePlan } from '../../core/uncertainty/clones';

// What a pool owes follows from CarryClones: the same batch gives the same outcomes wherever it is carried.

interface FakeCarrier extends CarrierPort {
  sent: CarrierRequest[];
  closed: boolean;
  say(message: CarrierResponse): void;
  die(reason: string): void;
}

const plan = (dimension: number): ClonePlan => ({
  gm: 'DE405',
  epochTdbSeconds: 0,
  toTdbSeconds: 1,
  state: new Float64Array(6),
  forces: null,
  factor: new Float64Array(9 * dimension),
  dimension,
});
const batch = (...z: number[]) => Float64Array.from(z);
const outcomes = (...rows: number[]): CloneOutcomes => ({
  count: rows.length,
  rows: Float64Array.from(rows),
});

/** A pool on carriers that do only what the test says. */
function setUp(size: number) {
  const carriers: FakeCarrier[] = [];
  const pool = createCarrierPool(() => {
    let hear: (message: CarrierResponse) => void = () => {};
    let mourn: (reason: string) => void = () => {};
    const carrier: FakeCarrier = {
      sent: [],
      closed: false,
      post: (request) => carrier.sent.push(request),
      listen(onMessage, onDeath) {
        hear = onMessage;
        mourn = onDeath;
      },
      close() {
        carrier.closed = true;
      },
      say: (message) => hear(message),
      die: (reason) => mourn(reason),
    };
    carriers.push(carrier);
    return carrier;
  }, size);
  return { pool, carriers };
}

/** Batches that a carrier has been sent. */
function batchesOf(carrier: FakeCarrier): { id: number; z: Float64Array }[] {
  return carrier.sent.flatMap((request) => (request.type === 'carry' ? [request] : []));
}

const tick = () => new Promise((resolve) => setImmediate(resolve));

describe('the pool of carriers', () => {
  it('starts no carrier before there is a batch, and no more than there is work for', () => {
    const { pool, carriers } = setUp(3);
    expect(carriers).toHaveLength(0);
    const carry = pool.carryFor(plan(1));
    void carry(batch(1));
    void carry(batch(2));
    expect(carriers).toHaveLength(2);
  });

  it('sends a plan once to each carrier, before its first batch, and a new one with a new case', () => {
    const { pool, carriers } = setUp(1);
    const [first, second] = [plan(1), plan(2)];
    void pool.carryFor(first)(batch(1));
    void pool.carryFor(first)(batch(2));
    const [{ id }] = batchesOf(carriers[0]);
    void pool.carryFor(second)(batch(3, 4));
    carriers[0].say({ type: 'carried', id, outcomes: outcomes(1) });
    expect(carriers[0].sent.map((r) => (r.type === 'plan' ? r.plan.dimension : r.type))).toEqual([
      1,
      'carry',
      'carry',
      2,
      'carry',
    ]);
    expect(carriers).toHaveLength(1);
  });

  it('gives each batch its own outcomes, in whatever order the carriers finish', async () => {
    const { pool, carriers } = setUp(2);
    const carry = pool.carryFor(plan(1));
    const asked = [10, 11, 12, 13].map((z) => carry(batch(z)));
    const sent = carriers.flatMap((carrier) =>
      batchesOf(carrier).map(({ id, z }) => ({ carrier, id, z: z[0] })),
    );
    expect(sent.map(({ z }) => z).sort()).toEqual([10, 11, 12, 13]);
    for (const { carrier, id, z } of sent.reverse()) {
      carrier.say({ type: 'carried', id, outcomes: outcomes(z * 2) });
    }
    expect((await Promise.all(asked)).map(({ rows }) => rows[0])).toEqual([20, 22, 24, 26]);
  });

  it('keeps at most as many batches at the carriers as it says that it takes at once', () => {
    const { pool, carriers } = setUp(2);
    const carry = pool.carryFor(plan(1));
    for (let i = 0; i < 9; i++) void carry(batch(i));
    const held = () => carriers.flatMap(batchesOf).length;
    expect(held()).toBe(pool.parallel);
    const [{ id }] = batchesOf(carriers[1]);
    carriers[1].say({ type: 'carried', id, outcomes: outcomes() });
    expect(held()).toBe(pool.parallel + 1);
  });

  it('gives the batches of a dead carrier to another one', async () => {
    const { pool, carriers } = setUp(1);
    const asked = pool.carryFor(plan(1))(batch(7));
    carriers[0].die('out of memory');
    expect(carriers[0].closed).toBe(true);
    expect(carriers).toHaveLength(2);
    const [again] = batchesOf(carriers[1]);
    expect(carriers[1].sent[0].type).toBe('plan');
    expect([...again.z]).toEqual([7]);
    carriers[1].say({ type: 'carried', id: again.id, outcomes: outcomes(14) });
    expect((await asked).rows[0]).toBe(14);
  });

  it('fails in words when a batch is lost a second time', async () => {
    const { pool, carriers } = setUp(1);
    const asked = pool.carryFor(plan(1))(batch(7));
    carriers[0].die('out of memory');
    carriers[1].die('out of memory again');
    const caught = await asked.catch((error) => error);
    expect(caught).toBeInstanceOf(CarrierDied);
    expect(caught.message).toContain('out of memory again');
    expect(carriers).toHaveLength(2);
  });

  it('does not carry a batch twice that was thrown at, and hands on its error', async () => {
    const { pool, carriers } = setUp(1);
    const asked = pool.carryFor(plan(1))(batch(7));
    const error = { name: 'StepCollapse', message: 'no step', code: 'step', stack: 'at carrier' };
    const [{ id }] = batchesOf(carriers[0]);
    carriers[0].say({ type: 'error', id, error });
    const caught = await asked.catch((reason) => reason);
    expect(caught).toBeInstanceOf(WorkerError);
    expect(caught).toMatchObject(error);
    expect(batchesOf(carriers[0])).toHaveLength(1);
  });

  it('rejects all that is pending when closed, ends the carriers, and starts new ones after', async () => {
    const { pool, carriers } = setUp(1);
    const carry = pool.carryFor(plan(1));
    const settled = Promise.allSettled([1, 2, 3].map((z) => carry(batch(z))));
    pool.close();
    for (const each of await settled) {
      expect(each.status === 'rejected' && each.reason).toBeInstanceOf(CarrierDied);
    }
    expect(carriers[0].closed).toBe(true);
    void carry(batch(4));
    expect(carriers).toHaveLength(2);
  });
});

describe('a carrier', () => {
  const load = async ({ dimension }: ClonePlan) => ({
    carry: (z: Float64Array) => outcomes(z[0] * dimension),
  });

  it('carries each batch for the plan that came before it, also while that one loads', async () => {
    const said: CarrierResponse[] = [];
    const handle = createCarrierHandler(load, (message) => said.push(message));
    void handle({ type: 'plan', plan: plan(2) });
    void handle({ type: 'carry', id: 1, z: batch(5) });
    void handle({ type: 'plan', plan: plan(3) });
    void handle({ type: 'carry', id: 2, z: batch(5) });
    await tick();
    expect(said.map((m) => (m.type === 'carried' ? [m.id, m.outcomes.rows[0]] : m.type))).toEqual([
      [1, 10],
      [2, 15],
    ]);
  });

  it('hands over the memory of the rows', async () => {
    const handed: Transferable[] = [];
    const said: CarrierResponse[] = [];
    const handle = createCarrierHandler(load, (message, transfer) => {
      said.push(message);
      handed.push(...transfer);
    });
    await handle({ type: 'plan', plan: plan(2) });
    await handle({ type: 'carry', id: 1, z: batch(5) });
    const [first] = said;
    expect(first.type === 'carried' && first.outcomes.rows.buffer).toBe(handed[0]);
  });

  it('tells every batch of a plan that could not be loaded why', async () => {
    const said: CarrierResponse[] = [];
    const handle = createCarrierHandler(
      () => Promise.reject(new RangeError('1066 is not covered')),
      (message) => said.push(message),
    );
    await handle({ type: 'plan', plan: plan(1) });
    await handle({ type: 'carry', id: 1, z: batch(5) });
    await handle({ type: 'carry', id: 2, z: batch(5) });
    expect(said).toMatchObject([
      { type: 'error', id: 1, error: { name: 'RangeError', message: '1066 is not covered' } },
      { type: 'error', id: 2, error: { name: 'RangeError' } },
    ]);
  });

  it('refuses a batch without a plan', async () => {
    const said: CarrierResponse[] = [];
    const handle = createCarrierHandler(load, (message) => said.push(message));
    await handle({ type: 'carry', id: 1, z: batch(5) });
    expect(said).toMatchObject([{ type: 'error', id: 1 }]);
  });
});
