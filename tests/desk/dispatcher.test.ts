import * as v from 'valibot';
import { afterEach, describe, expect, it } from 'vitest';
import { createDispatcher, type DispatcherDeps } from '../../app/worker/dispatcher';
import { createEstimateStream } from '../../app/worker/estimate-stream';
import type { DeskState, Request, Response } from '../../app/worker/messages';
import { type EstimateEvent, SAMPLE } from '../../core/events';
import { type Report, reportSchema } from '../../core/report/report';
import type { ClonePlan } from '../../core/uncertainty/clones';
import { sampleCorridor } from '../core/report/corridor-sample';
import { INVENTED_CASE, inventedReport, reading, samplesAt } from './fixtures/report';

// Expected answers follow from the contract of app/worker/messages.ts, not from the dispatcher.

type Deps = DispatcherDeps<string, { plan: ClonePlan }>;

const DESK: DeskState = { text: 'x', choices: {}, clockTdbSeconds: 5, plateFindings: ['answer'] };

const PLAN: ClonePlan = {
  gm: 'DE405',
  epochTdbSeconds: 0,
  toTdbSeconds: 1,
  state: new Float64Array(6),
  forces: null,
  factor: new Float64Array(9),
  dimension: 1,
};

/** A pool whose every batch is one clone. */
function fakePool(): Deps['pool'] {
  const outcomes = { count: 1, rows: new Float64Array(0) };
  return {
    parallel: 2,
    carryFor: (plan) => async () => {
      if (plan !== PLAN) throw new Error('another plan');
      await new Promise((resolve) => setImmediate(resolve));
      return outcomes;
    },
    close() {},
  };
}

const clonesEvent = (
  count: number,
  wanted: number,
  drawn: 'plain' | 'rare' = 'plain',
): EstimateEvent => ({
  type: 'clones',
  approach: 0,
  count,
  wanted,
  impacts: 0,
  interval95: [0, 1],
  points: Float32Array.of(count),
  drawn,
});

/** Carries one clone after another and says how many in the fingerprint of its report. */
function fakeEstimate(seed: number): ReturnType<Deps['createEstimate']> {
  let count = 0;
  let runs = 0;
  return {
    async run(wanted, host) {
      runs += 1;
      if (runs > 1) throw new Error('two runs at once');
      while (count < wanted && !host.stopped()) {
        count += (await host.carry(Float64Array.of(0))).count;
        host.emit(clonesEvent(count, wanted));
      }
      runs -= 1;
      const report = estimated(seed, count);
      host.emit({ type: 'report', report });
      return report;
    },
  };
}

const estimated = (seed: number, count: number): Report =>
  inventedReport({ fingerprint: `seed ${seed}, ${count} clones` });

function fakeDeps(changes: Partial<Deps> = {}): Omit<Deps, 'post'> {
  return {
    readCase: (text) => reading(text === 'bad' ? null : INVENTED_CASE),
    readDesk: (text) => (text.startsWith('{') ? DESK : null),
    async assess(_input, _ephemeris, host) {
      host.emit({ type: 'states', direction: 1, samples: samplesAt(0, 10) });
      await host.pause();
      host.emit({ type: 'states', direction: -1, samples: samplesAt(-10, -20) });
      const report = inventedReport();
      host.emit({ type: 'report', report });
      return { report, estimate: { plan: PLAN } };
    },
    createEstimate: (_basis, seed) => fakeEstimate(seed),
    pool: fakePool(),
    now: () => 0,
    writers: {
      reportJsonText: (report) => `json ${report.fingerprint} ${report.madeAt}`,
      writeOem: (_report, samples) =>
        `oem ${[0, 1, 2, 3].map((row) => samples[row * SAMPLE.stride]).join(' ')}`,
      writeEphemerisCsv: (samples) => `csv ${samples.length / SAMPLE.stride}`,
      corridorGeoJson: (report) => `corridor of ${report.corridor?.clones}`,
      writeCaseFile: (orbit, desk) => `case ${orbit.name} ${desk.clockTdbSeconds}`,
    },
    ephemeris: 'the ephemeris',
    fetchFile: () => Promise.reject(new Error('nothing is fetched here')),
    pause: () => new Promise((resolve) => setImmediate(resolve)),
    ...changes,
  };
}

interface Line {
  send(request: Request): void;
  received: Response[];
  /** Resolves with the first response that fits, arrived or still to come. */
  until(fits: (response: Response) => boolean): Promise<Response>;
  close(): void;
}

function collector() {
  const received: Response[] = [];
  const waiting: (() => void)[] = [];
  return {
    received,
    take(response: Response) {
      received.push(response);
      for (const look of [...waiting]) look();
    },
    until(fits: (response: Response) => boolean): Promise<Response> {
      return new Promise((resolve) => {
        const look = () => {
          const found = received.find(fits);
          if (found !== undefined) resolve(found);
        };
        waiting.push(look);
        look();
      });
    },
  };
}

function straight(deps: Omit<Deps, 'post'>): Line {
  const { received, take, until } = collector();
  const handle = createDispatcher({ ...deps, post: take });
  return { send: (request) => void handle(request), received, until, close: () => {} };
}

/** Both ends of a real MessageChannel: everything is cloned or transferred on the way. */
function throughPorts(deps: Omit<Deps, 'post'>): Line {
  const { port1: page, port2: worker } = new MessageChannel();
  const { received, take, until } = collector();
  const handle = createDispatcher({
    ...deps,
    post: (message, transfer) => worker.postMessage(message, transfer),
  });
  worker.onmessage = (message) => void handle(message.data);
  page.onmessage = (message) => take(message.data);
  return {
    send: (request) => page.postMessage(request),
    received,
    until,
    close: () => page.close(),
  };
}

const assess = (id: number): Request => ({
  type: 'assess',
  id,
  text: '1 2 3 4 5 6',
  reading: reading(INVENTED_CASE),
  case: INVENTED_CASE,
  madeAt: '2026-03-01T00:00:00Z',
});
const of = (id: number, type: Response['type']) => (response: Response) =>
  response.id === id && response.type === type;

/** An assessment that waits at a gate until the test lets it go on. */
function gated() {
  const gates: (() => void)[] = [];
  const deps = fakeDeps({
    async assess(_input, _ephemeris, host) {
      host.emit({ type: 'progress', fraction: 0.1, note: 'before' });
      await new Promise<void>((resolve) => gates.push(resolve));
      host.emit({ type: 'progress', fraction: 0.9, note: host.cancelled() ? 'silenced' : 'live' });
      if (host.cancelled()) throw new Error('stopped');
      return { report: inventedReport(), estimate: null };
    },
  });
  return { deps, gates };
}

describe.each([
  ['straight', straight],
  ['through a pair of ports', throughPorts],
])('the dispatcher, %s', (_name, connect) => {
  const open: Line[] = [];
  const line = (deps: Omit<Deps, 'post'>) => {
    const connected = connect(deps);
    open.push(connected);
    return connected;
  };
  afterEach(() => {
    for (const each of open.splice(0)) each.close();
  });

  it('answers a read with the reading under the id of the request', async () => {
    const { send, until } = line(fakeDeps());
    send({ type: 'read', id: 7, text: 'any', choices: {} });
    expect(await until(of(7, 'read'))).toEqual({
      type: 'read',
      id: 7,
      result: reading(INVENTED_CASE),
      desk: null,
    });
  });

  it('hands over what a case file says of the desk', async () => {
    const { send, until } = line(fakeDeps());
    send({ type: 'read', id: 1, text: '{"format":"…"}', choices: {} });
    expect(await until(of(1, 'read'))).toMatchObject({ desk: DESK });
  });

  it('streams the events of an assessment in order, then says done', async () => {
    const { send, until, received } = line(fakeDeps());
    send(assess(3));
    await until(of(3, 'done'));
    expect(received.map((r) => (r.type === 'event' ? r.event.type : r.type))).toEqual([
      'states',
      'states',
      'report',
      'done',
    ]);
    const first = received[0];
    if (first.type !== 'event' || first.event.type !== 'states') throw new Error('no states');
    expect([first.event.samples[0], first.event.samples[SAMPLE.stride]]).toEqual([0, 10]);
  });

  it('silences the running assessment at once when a new one comes', async () => {
    const { deps, gates } = gated();
    const { send, until, received } = line(deps);
    send(assess(1));
    await until(of(1, 'event'));
    send(assess(2));
    await until(of(2, 'event'));
    expect(received.filter(of(1, 'cancelled'))).toHaveLength(1);
    for (const open of gates) open();
    await until(of(2, 'done'));
    await new Promise((resolve) => setImmediate(resolve));
    expect(received.filter((r) => r.id === 1).map((r) => r.type)).toEqual(['event', 'cancelled']);
  });

  it('stops the assessment a cancel names, and no other', async () => {
    const { deps, gates } = gated();
    const { send, until, received } = line(deps);
    send(assess(1));
    await until(of(1, 'event'));
    send({ type: 'cancel', id: 99 });
    send({ type: 'read', id: 2, text: 'any', choices: {} });
    await until(of(2, 'read'));
    expect(received.some((r) => r.type === 'cancelled')).toBe(false);
    send({ type: 'cancel', id: 1 });
    await until(of(1, 'cancelled'));
    for (const open of gates) open();
    await new Promise((resolve) => setImmediate(resolve));
    expect(received.some(of(1, 'done'))).toBe(false);
    expect(received.some(of(1, 'error'))).toBe(false);
  });

  it('carries the name, message, code and stack of an error across', async () => {
    class Odd extends Error {
      readonly code = 'odd-epoch';
      override name = 'Odd';
    }
    const { send, until } = line(
      fakeDeps({ assess: () => Promise.reject(new Odd('1066 is not covered')) }),
    );
    send(assess(4));
    const answer = await until(of(4, 'error'));
    expect(answer).toMatchObject({
      error: { name: 'Odd', message: '1066 is not covered', code: 'odd-epoch' },
    });
    expect(answer.type === 'error' && answer.error.stack).toContain('dispatcher.test');
  });

  it('answers a read that throws with an error and goes on', async () => {
    let calls = 0;
    const { send, until } = line(
      fakeDeps({
        readCase() {
          calls += 1;
          if (calls === 1) throw new TypeError('broken');
          return reading(null);
        },
      }),
    );
    send({ type: 'read', id: 1, text: 'a', choices: {} });
    expect(await until(of(1, 'error'))).toMatchObject({ error: { name: 'TypeError', code: null } });
    send({ type: 'read', id: 2, text: 'a', choices: {} });
    expect(await until(of(2, 'read'))).toMatchObject({ result: { case: null } });
  });

  it('writes files of the finished report with all samples in order of time', async () => {
    const { send, until } = line(fakeDeps());
    send(assess(1));
    await until(of(1, 'done'));
    const madeAt = '2026-03-02T00:00:00Z';
    send({ type: 'export', id: 2, kind: 'report-json', madeAt, desk: null });
    send({ type: 'export', id: 3, kind: 'oem', madeAt, desk: null });
    send({ type: 'export', id: 4, kind: 'ephemeris-csv', madeAt, desk: null });
    const { fingerprint, madeAt: made } = inventedReport();
    expect(await until(of(2, 'export'))).toMatchObject({
      fileName: 'Sample-One-invented-a1b2c3d4-report.json',
      mediaType: 'application/json',
      text: `json ${fingerprint} ${made}`,
    });
    expect(await until(of(3, 'export'))).toMatchObject({
      fileName: 'Sample-One-invented-a1b2c3d4.oem',
      text: 'oem -20 -10 0 10',
    });
    expect(await until(of(4, 'export'))).toMatchObject({
      fileName: 'Sample-One-invented-a1b2c3d4-ephemeris.csv',
      text: 'csv 4',
    });
  });

  it('writes the corridor where there is one, and says so where there is none', async () => {
    const reports = [inventedReport(), inventedReport({ corridor: sampleCorridor({ count: 12 }) })];
    const { send, until } = line(
      fakeDeps({
        async assess() {
          const report = reports.shift();
          if (report === undefined) throw new Error('no more reports');
          return { report, estimate: null };
        },
      }),
    );
    send(assess(1));
    await until(of(1, 'done'));
    send({ type: 'export', id: 2, kind: 'corridor-geojson', madeAt: '', desk: null });
    expect(await until(of(2, 'error'))).toMatchObject({
      error: { code: 'nothing-to-export', message: expect.stringContaining('no corridor') },
    });
    send(assess(3));
    await until(of(3, 'done'));
    send({ type: 'export', id: 4, kind: 'corridor-geojson', madeAt: '', desk: null });
    expect(await until(of(4, 'export'))).toMatchObject({
      fileName: 'Sample-One-invented-a1b2c3d4-corridor.geojson',
      mediaType: 'application/geo+json',
      text: 'corridor of 12',
    });
  });

  it('keeps the last finished report for export while a newer run is stopped', async () => {
    let runs = 0;
    const { send, until } = line(
      fakeDeps({
        async assess(_input, _ephemeris, host) {
          runs += 1;
          if (runs === 1) return { report: inventedReport(), estimate: null };
          host.emit({ type: 'progress', fraction: 0, note: '' });
          return new Promise(() => {});
        },
      }),
    );
    send(assess(1));
    await until(of(1, 'done'));
    send(assess(2));
    await until(of(2, 'event'));
    send({ type: 'cancel', id: 2 });
    send({ type: 'export', id: 3, kind: 'report-json', madeAt: '', desk: null });
    expect(await until(of(3, 'export'))).toMatchObject({ mediaType: 'application/json' });
  });

  it('writes a case file from the last complete reading and the desk it is given', async () => {
    const { send, until } = line(fakeDeps());
    send({ type: 'read', id: 1, text: 'any', choices: {} });
    send({ type: 'export', id: 2, kind: 'case-file', madeAt: '', desk: DESK });
    expect(await until(of(2, 'export'))).toMatchObject({
      fileName: 'Sample-One-invented-case.json',
      text: `case ${INVENTED_CASE.name} 5`,
    });
  });

  it.each(['report-json', 'oem', 'ephemeris-csv', 'corridor-geojson', 'case-file'] as const)(
    'refuses to write %s before there is anything to write',
    async (kind) => {
      const { send, until } = line(fakeDeps());
      send({ type: 'export', id: 1, kind, madeAt: '', desk: DESK });
      expect(await until(of(1, 'error'))).toMatchObject({ error: { code: 'nothing-to-export' } });
    },
  );

  it('hands the ephemeris and the fetcher it was given to the assessment', async () => {
    const seen: unknown[] = [];
    const { send, until } = line(
      fakeDeps({
        fetchFile: async (name) => new TextEncoder().encode(name).buffer,
        async assess(input, ephemeris, host) {
          seen.push(input.madeAt, ephemeris, (await host.fetchFile('a.bin')).byteLength);
          return { report: inventedReport(), estimate: null };
        },
      }),
    );
    send(assess(1));
    await until(of(1, 'done'));
    expect(seen).toEqual(['2026-03-01T00:00:00Z', 'the ephemeris', 5]);
  });

  it('estimates on what was assessed, and writes the report of the estimate from then on', async () => {
    const { send, until, received } = line(fakeDeps());
    send(assess(1));
    await until(of(1, 'done'));
    send({ type: 'estimate', id: 2, clones: 3, seed: 5 });
    await until(of(2, 'done'));
    expect(counts(received, 2).at(-1)).toBe(3);
    expect(reports(received, 2)).toEqual([estimated(5, 3)]);
    send({ type: 'export', id: 3, kind: 'report-json', madeAt: '', desk: null });
    expect(await until(of(3, 'export'))).toMatchObject({
      text: expect.stringContaining('seed 5, 3 clones'),
    });
  });

  it('carries on where a stopped estimate is, and starts afresh with another seed', async () => {
    const { send, until, received } = line(fakeDeps({ now: rising() }));
    send(assess(1));
    await until(of(1, 'done'));
    send({ type: 'estimate', id: 2, clones: 1e9, seed: 5 });
    await until(of(2, 'estimate-event'));
    send({ type: 'stop-estimate', id: 2 });
    await until(of(2, 'done'));
    const stoppedAt = counts(received, 2).at(-1) ?? 0;
    expect(reports(received, 2)).toEqual([estimated(5, stoppedAt)]);
    send({ type: 'estimate', id: 3, clones: stoppedAt + 2, seed: 5 });
    await until(of(3, 'done'));
    expect(counts(received, 3)).toEqual([stoppedAt + 1, stoppedAt + 2]);
    send({ type: 'estimate', id: 4, clones: 2, seed: 6 });
    await until(of(4, 'done'));
    expect(counts(received, 4)).toEqual([1, 2]);
  });

  it.each(['a new assessment', 'a cancel'])('silences a running estimate at %s', async (how) => {
    const { send, until, received } = line(fakeDeps({ now: rising() }));
    send(assess(1));
    await until(of(1, 'done'));
    send({ type: 'estimate', id: 2, clones: 1e9, seed: 5 });
    await until(of(2, 'estimate-event'));
    send(how === 'a cancel' ? { type: 'cancel', id: 2 } : assess(3));
    await until(of(2, 'cancelled'));
    const heard = received.filter((r) => r.id === 2).length;
    // Another run of the same clones waits for the silenced one: the fake throws otherwise.
    if (how === 'a new assessment') await until(of(3, 'done'));
    send({ type: 'estimate', id: 4, clones: 1, seed: 5 });
    await until(of(4, 'done'));
    expect(received.filter((r) => r.id === 2)).toHaveLength(heard);
    expect(received.filter(of(2, 'cancelled'))).toHaveLength(1);
  });

  it('says that there is nothing to estimate without a covariance', async () => {
    const { send, until } = line(
      fakeDeps({ assess: async () => ({ report: inventedReport(), estimate: null }) }),
    );
    send({ type: 'estimate', id: 1, clones: 1, seed: 1 });
    expect(await until(of(1, 'error'))).toMatchObject({ error: { code: 'nothing-to-estimate' } });
    send(assess(2));
    await until(of(2, 'done'));
    send({ type: 'estimate', id: 3, clones: 1, seed: 1 });
    expect(await until(of(3, 'error'))).toMatchObject({ error: { code: 'nothing-to-estimate' } });
  });

  it('carries the error of a carrier across', async () => {
    const pool: Deps['pool'] = {
      parallel: 1,
      carryFor: () => () => Promise.reject(new RangeError('the carrier is gone')),
      close() {},
    };
    const { send, until } = line(fakeDeps({ pool }));
    send(assess(1));
    await until(of(1, 'done'));
    send({ type: 'estimate', id: 2, clones: 1, seed: 1 });
    expect(await until(of(2, 'error'))).toMatchObject({
      error: { name: 'RangeError', message: 'the carrier is gone' },
    });
  });
});

/** A clock on which every look is a second later: nothing is held back. */
function rising(): () => number {
  let ms = 0;
  return () => {
    ms += 1000;
    return ms;
  };
}

function events(received: Response[], id: number): EstimateEvent[] {
  return received.flatMap((r) => (r.type === 'estimate-event' && r.id === id ? [r.event] : []));
}
const counts = (received: Response[], id: number): number[] =>
  events(received, id).flatMap((event) => (event.type === 'clones' ? [event.count] : []));
const reports = (received: Response[], id: number): Report[] =>
  events(received, id).flatMap((event) => (event.type === 'report' ? [event.report] : []));

describe('the stream of an estimate', () => {
  function heardAt(...takes: [ms: number, event: EstimateEvent][]) {
    let ms = 0;
    const heard: EstimateEvent[] = [];
    const stream = createEstimateStream(
      (event) => heard.push(event),
      () => ms,
    );
    for (const [at, event] of takes) {
      ms = at;
      stream.take(event);
    }
    return { heard, stream };
  }

  it('tells of the first clones at once and then ten times a second, losing no point', () => {
    const takes = Array.from({ length: 100 }, (_, i): [number, EstimateEvent] => [
      i * 10,
      clonesEvent(i, 100),
    ]);
    const { heard, stream } = heardAt(...takes);
    expect(heard).toHaveLength(10);
    stream.flush();
    const points = heard.flatMap((event) => (event.type === 'clones' ? [...event.points] : []));
    expect(points).toEqual(Array.from({ length: 100 }, (_, i) => i));
  });

  it('tells the last clones before the report', () => {
    const { heard } = heardAt(
      [0, clonesEvent(1, 3)],
      [1, clonesEvent(2, 3)],
      [2, clonesEvent(3, 3)],
      [3, { type: 'report', report: inventedReport() }],
    );
    expect(heard.map((event) => (event.type === 'clones' ? event.count : event.type))).toEqual([
      1,
      3,
      'report',
    ]);
  });

  it('keeps plain and rare clones apart', () => {
    const { heard, stream } = heardAt(
      [0, clonesEvent(1, 3)],
      [1, clonesEvent(2, 3)],
      [2, clonesEvent(3, 3, 'rare')],
    );
    stream.flush();
    expect(heard.map((event) => (event.type === 'clones' ? event.drawn : event.type))).toEqual([
      'plain',
      'plain',
      'rare',
    ]);
  });
});

it('transfers the samples: the assessment is left with an empty buffer', async () => {
  const samples = samplesAt(0, 10);
  const channel = new MessageChannel();
  const handle = createDispatcher({
    ...fakeDeps({
      async assess(_input, _ephemeris, host) {
        host.emit({ type: 'states', direction: 1, samples });
        return { report: inventedReport(), estimate: null };
      },
    }),
    post: (message, transfer) => channel.port1.postMessage(message, transfer),
  });
  await handle(assess(1));
  expect(samples.byteLength).toBe(0);
  channel.port1.close();
});

it('the report the tests use is one the schema accepts', () => {
  expect(v.safeParse(reportSchema, inventedReport()).success).toBe(true);
});
