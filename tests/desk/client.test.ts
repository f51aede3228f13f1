import { describe, expect, it } from 'vitest';
import { createWorkerClient, type Port, WorkerDied } from '../../app/worker/client';
import type { Request, Response } from '../../app/worker/messages';
import { WorkerError } from '../../app/worker/wire-error';
import { INVENTED_CASE, reading } from './fixtures/report';

interface FakeWorker extends Port {
  sent: Request[];
  closed: boolean;
  say(response: Response): void;
  die(reason: string): void;
}

/** A client on workers that do only what the test says. */
function setUp() {
  const workers: FakeWorker[] = [];
  const client = createWorkerClient(() => {
    let hear: (response: Response) => void = () => {};
    let mourn: (reason: string) => void = () => {};
    const worker: FakeWorker = {
      sent: [],
      closed: false,
      post: (request) => worker.sent.push(request),
      listen: (onMessage, onDeath) => {
        hear = onMessage;
        mourn = onDeath;
      },
      close: () => {
        worker.closed = true;
      },
      say: (response) => hear(response),
      die: (reason) => mourn(reason),
    };
    workers.push(worker);
    return worker;
  });
  return { client, workers };
}

const REQUEST = { text: 't', reading: reading(INVENTED_CASE), case: INVENTED_CASE, madeAt: 'now' };
const progress = (id: number, fraction: number): Response => ({
  type: 'event',
  id,
  event: { type: 'progress', fraction, note: '' },
});

describe('the worker client', () => {
  it('starts a worker before anything is asked', () => {
    expect(setUp().workers).toHaveLength(1);
  });

  it('gives each answer to the request whose id it carries', async () => {
    const { client, workers } = setUp();
    const first = client.read('one', {});
    const second = client.read('two', {});
    const [a, b] = workers[0].sent;
    workers[0].say({ type: 'read', id: b.id, result: reading(null), desk: null });
    workers[0].say({ type: 'read', id: a.id, result: reading(INVENTED_CASE), desk: null });
    expect((await second).result.case).toBeNull();
    expect((await first).result.case).toEqual(INVENTED_CASE);
  });

  it('streams events until done', async () => {
    const { client, workers } = setUp();
    const seen: number[] = [];
    const run = client.assess(REQUEST, (event) => {
      if (event.type === 'progress') seen.push(event.fraction);
    });
    const { id } = workers[0].sent[0];
    workers[0].say(progress(id, 0.25));
    workers[0].say(progress(id, 0.5));
    workers[0].say({ type: 'done', id });
    workers[0].say(progress(id, 0.75));
    expect(await run.outcome).toBe('done');
    expect(seen).toEqual([0.25, 0.5]);
  });

  it('says cancelled at once, without waiting for the worker, and hears no more of the run', async () => {
    const { client, workers } = setUp();
    const seen: number[] = [];
    const run = client.assess(REQUEST, () => seen.push(1));
    const { id } = workers[0].sent[0];
    run.cancel();
    expect(await run.outcome).toBe('cancelled');
    expect(workers[0].sent[1]).toEqual({ type: 'cancel', id });
    workers[0].say(progress(id, 0.5));
    expect(seen).toEqual([]);
  });

  it('cancels the running assessment when a new one is started', async () => {
    const { client, workers } = setUp();
    const old = client.assess(REQUEST, () => {});
    const next = client.assess(REQUEST, () => {});
    expect(await old.outcome).toBe('cancelled');
    const ids = workers[0].sent.filter((r) => r.type === 'assess').map((r) => r.id);
    workers[0].say({ type: 'done', id: ids[1] });
    expect(await next.outcome).toBe('done');
  });

  it('rejects with the name, message, code and stack the error had in the worker', async () => {
    const { client, workers } = setUp();
    const run = client.assess(REQUEST, () => {});
    const error = { name: 'Odd', message: 'no', code: 'odd', stack: 'at worker' };
    workers[0].say({ type: 'error', id: workers[0].sent[0].id, error });
    const caught = await run.outcome.catch((e) => e);
    expect(caught).toBeInstanceOf(WorkerError);
    expect(caught).toMatchObject(error);
  });

  it('rejects every pending request when the worker dies, and closes it', async () => {
    const { client, workers } = setUp();
    const asked = [
      client.read('a', {}),
      client.exportFile('oem', 'now', null),
      client.assess(REQUEST, () => {}).outcome,
    ];
    const settled = Promise.allSettled(asked);
    workers[0].die('it fell over');
    for (const each of await settled) {
      expect(each.status).toBe('rejected');
      if (each.status !== 'rejected') continue;
      expect(each.reason).toBeInstanceOf(WorkerDied);
      expect(each.reason.message).toBe('it fell over');
    }
    expect(workers[0].closed).toBe(true);
  });

  it('starts a new worker with the next request after a death', async () => {
    const { client, workers } = setUp();
    workers[0].die('gone');
    const asked = client.read('again', {});
    expect(workers).toHaveLength(2);
    workers[0].say({ type: 'read', id: 1, result: reading(INVENTED_CASE), desk: null });
    workers[1].say({ type: 'read', id: 1, result: reading(null), desk: null });
    expect((await asked).result.case).toBeNull();
  });

  it('rejects what is pending when it is closed', async () => {
    const { client, workers } = setUp();
    const asked = client.read('a', {});
    client.close();
    await expect(asked).rejects.toBeInstanceOf(WorkerDied);
    expect(workers[0].closed).toBe(true);
  });

  it('streams the events of an estimate until done, and hears none of an assessment under its id', async () => {
    const { client, workers } = setUp();
    const seen: number[] = [];
    const run = client.estimate({ clones: 500, seed: 3 }, (event) => {
      if (event.type === 'progress') seen.push(event.fraction);
    });
    const [{ id }] = workers[0].sent;
    expect(workers[0].sent[0]).toEqual({ type: 'estimate', id, clones: 500, seed: 3 });
    const event = { type: 'progress' as const, fraction: 0.5, note: '' };
    workers[0].say({ type: 'estimate-event', id, event });
    workers[0].say(progress(id, 0.75));
    workers[0].say({ type: 'done', id });
    expect(await run.outcome).toBe('done');
    expect(seen).toEqual([0.5]);
  });

  it('still hears of an estimate that was asked to stop, and stops it once it is done no more', async () => {
    const { client, workers } = setUp();
    const seen: number[] = [];
    const run = client.estimate({ clones: 500, seed: 1 }, () => seen.push(1));
    const [{ id }] = workers[0].sent;
    run.stop();
    expect(workers[0].sent[1]).toEqual({ type: 'stop-estimate', id });
    const event = { type: 'progress' as const, fraction: 0.5, note: '' };
    workers[0].say({ type: 'estimate-event', id, event });
    workers[0].say({ type: 'done', id });
    expect(await run.outcome).toBe('done');
    run.stop();
    expect(workers[0].sent).toHaveLength(2);
    expect(seen).toEqual([1]);
  });

  it('cancels the estimate of the case before when an assessment is started', async () => {
    const { client, workers } = setUp();
    const seen: number[] = [];
    const run = client.estimate({ clones: 500, seed: 1 }, () => seen.push(1));
    const [{ id }] = workers[0].sent;
    client.assess(REQUEST, () => {});
    expect(await run.outcome).toBe('cancelled');
    const event = { type: 'progress' as const, fraction: 0.5, note: '' };
    workers[0].say({ type: 'estimate-event', id, event });
    expect(seen).toEqual([]);
  });
});
