import * as v from 'valibot';
import { afterEach, describe, expect, it } from 'vitest';
import { createDispatcher, type DispatcherDeps } from '../../app/worker/dispatcher';
import type { DeskState, Request, Response } from '../../app/worker/messages';
import { SAMPLE } from '../../core/events';
import { reportSchema } from '../../core/report/report';
import { INVENTED_CASE, inventedReport, reading, samplesAt } from './fixtures/report';

// Expected answers follow from the contract of app/worker/messages.ts, not from the dispatcher.

type Deps = DispatcherDeps<string>;

const DESK: DeskState = { text: 'x', choices: {}, clockTdbSeconds: 5, plateFindings: ['answer'] };

function fakeDeps(changes: Partial<Deps> = {}): Omit<Deps, 'post'> {
  return {
    readCase: (text) => reading(text === 'bad' ? null : INVENTED_CASE),
    readDesk: (text) => (text.startsWith('{') ? DESK : null),
    async runAssessment(_input, _ephemeris, host) {
      host.emit({ type: 'states', direction: 1, samples: samplesAt(0, 10) });
      await host.pause();
      host.emit({ type: 'states', direction: -1, samples: samplesAt(-10, -20) });
      const report = inventedReport();
      host.emit({ type: 'report', report });
      return report;
    },
    writers: {
      reportJsonText: (report) => `json ${report.fingerprint} ${report.madeAt}`,
      writeOem: (_report, samples) =>
        `oem ${[0, 1, 2, 3].map((row) => samples[row * SAMPLE.stride]).join(' ')}`,
      writeEphemerisCsv: (samples) => `csv ${samples.length / SAMPLE.stride}`,
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
    async runAssessment(_input, _ephemeris, host) {
      host.emit({ type: 'progress', fraction: 0.1, note: 'before' });
      await new Promise<void>((resolve) => gates.push(resolve));
      host.emit({ type: 'progress', fraction: 0.9, note: host.cancelled() ? 'silenced' : 'live' });
      if (host.cancelled()) throw new Error('stopped');
      return inventedReport();
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
      fakeDeps({ runAssessment: () => Promise.reject(new Odd('1066 is not covered')) }),
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

  it('keeps the last finished report for export while a newer run is stopped', async () => {
    let runs = 0;
    const { send, until } = line(
      fakeDeps({
        async runAssessment(_input, _ephemeris, host) {
          runs += 1;
          if (runs === 1) return inventedReport();
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

  it.each(['report-json', 'oem', 'ephemeris-csv', 'case-file'] as const)(
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
        async runAssessment(input, ephemeris, host) {
          seen.push(input.madeAt, ephemeris, (await host.fetchFile('a.bin')).byteLength);
          return inventedReport();
        },
      }),
    );
    send(assess(1));
    await until(of(1, 'done'));
    expect(seen).toEqual(['2026-03-01T00:00:00Z', 'the ephemeris', 5]);
  });
});

it('transfers the samples: the assessment is left with an empty buffer', async () => {
  const samples = samplesAt(0, 10);
  const channel = new MessageChannel();
  const handle = createDispatcher({
    ...fakeDeps({
      async runAssessment(_input, _ephemeris, host) {
        host.emit({ type: 'states', direction: 1, samples });
        return inventedReport();
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
