import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { createController } from '../../app/desk/controller';
import { createClock } from '../../app/store/clock';
import { createDeskStore } from '../../app/store/store';
import {
  type AssessRequest,
  type EstimateRequest,
  type WorkerClient,
  WorkerDied,
} from '../../app/worker/client';
import type { DeskState } from '../../app/worker/messages';
import type { AssessEvent, EstimateEvent } from '../../core/events';
import type { Finding, Report } from '../../core/report/report';
import { INVENTED_CASE, inventedReport, reading, samplesAt } from './fixtures/report';

// The desk's manner is the specification here: what is known stays, what is old is marked,
// the clock is the person's once the person has touched it.

interface Run {
  request: AssessRequest;
  tell(event: AssessEvent): void;
  finish(outcome: 'done' | 'cancelled'): void;
  fail(error: Error): void;
  cancelled: boolean;
}

interface Carrying extends Omit<Run, 'request' | 'tell'> {
  request: EstimateRequest;
  tell(event: EstimateEvent): void;
  stopped: boolean;
}

const CASE_FILE: DeskState = {
  text: '1 2 3 4 5 6',
  choices: { centre: 'Sun' },
  clockTdbSeconds: 4000,
  plateFindings: ['moid'],
};

function setUp() {
  const store = createDeskStore();
  const clock = createClock();
  const reads: string[] = [];
  const runs: Run[] = [];
  const estimates: Carrying[] = [];
  const saved: { fileName: string; content: Blob }[] = [];
  const asked: unknown[] = [];
  const client: WorkerClient = {
    async read(text) {
      reads.push(text);
      const desk = text.startsWith('{') ? CASE_FILE : null;
      return { result: reading(text.includes('bad') ? null : INVENTED_CASE), desk };
    },
    assess(request, tell) {
      const { outcome, finish, fail } = ending();
      const run: Run = { request, tell, finish, fail, cancelled: false };
      runs.push(run);
      return {
        outcome,
        cancel() {
          run.cancelled = true;
          finish('cancelled');
        },
      };
    },
    estimate(request, tell) {
      const { outcome, finish, fail } = ending();
      const run: Carrying = { request, tell, finish, fail, cancelled: false, stopped: false };
      estimates.push(run);
      return {
        outcome,
        stop() {
          run.stopped = true;
        },
        cancel() {
          run.cancelled = true;
          finish('cancelled');
        },
      };
    },
    async exportFile(kind, madeAt, desk) {
      asked.push({ kind, madeAt, desk });
      return { fileName: `x.${kind}`, mediaType: 'text/plain', text: 'content' };
    },
    close() {},
  };
  const controller = createController({
    store,
    clock,
    client,
    now: () => '2026-03-01T00:00:00Z',
    drawPlate: async (report, trajectory) =>
      new Blob([`${report.fingerprint} ${trajectory.count}`]),
    save: (fileName, content) => saved.push({ fileName, content }),
  });
  return { store, clock, controller, reads, runs, estimates, saved, asked, state: store.getState };
}

function ending() {
  let finish: (outcome: 'done' | 'cancelled') => void = () => {};
  let fail: (error: Error) => void = () => {};
  const outcome = new Promise<'done' | 'cancelled'>((resolve, reject) => {
    finish = resolve;
    fail = reject;
  });
  return { outcome, finish, fail };
}

const settle = () => vi.advanceTimersByTimeAsync(0);
const states = (...times: number[]): AssessEvent => ({
  type: 'states',
  direction: 1,
  samples: samplesAt(...times),
});
const reported = (report: Report = inventedReport()): AssessEvent => ({ type: 'report', report });
const support = (id: string): Finding => ({
  id,
  kind: 'support',
  text: id,
  figures: [],
  basis: { model: '', formula: '', source: '' },
  caution: null,
  tdbSeconds: null,
});

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

/** Takes the desk to a finished first case with states from 0 s to 86 400 s. */
async function finished(report = inventedReport()) {
  const desk = setUp();
  desk.controller.setText('first', 'replaced');
  await settle();
  desk.runs[0].tell(states(0, 86400));
  desk.runs[0].tell(reported(report));
  desk.runs[0].finish('done');
  await settle();
  return desk;
}

describe('reading', () => {
  it('reads a pasted text at once', () => {
    const { controller, reads } = setUp();
    controller.setText('pasted', 'replaced');
    expect(reads).toEqual(['pasted']);
  });

  it('reads typed text once, when the typing rests', async () => {
    const { controller, reads } = setUp();
    controller.setText('t', 'typed');
    await vi.advanceTimersByTimeAsync(60);
    controller.setText('ty', 'typed');
    await vi.advanceTimersByTimeAsync(60);
    expect(reads).toEqual([]);
    await vi.advanceTimersByTimeAsync(200);
    expect(reads).toEqual(['ty']);
  });

  it('assesses a complete case and nothing else', async () => {
    const { controller, runs, state } = setUp();
    controller.setText('bad', 'replaced');
    await settle();
    expect(runs).toHaveLength(0);
    expect(state().run.status).toBe('idle');
    controller.setText('good', 'replaced');
    await settle();
    expect(runs[0].request).toMatchObject({
      text: 'good',
      case: INVENTED_CASE,
      madeAt: '2026-03-01T00:00:00Z',
    });
    expect(state().run.status).toBe('running');
  });

  it('drops the answer to a text that has been replaced meanwhile', async () => {
    const { controller, runs } = setUp();
    controller.setText('one', 'replaced');
    controller.setText('two', 'replaced');
    await settle();
    expect(runs.map((run) => run.request.text)).toEqual(['two']);
  });

  it('keeps choices while typing and forgets them with a new text', async () => {
    const { controller, state } = setUp();
    controller.setText('one', 'replaced');
    controller.setChoice('centre', 'Sun');
    controller.setText('one ', 'typed');
    expect(state().choices).toEqual({ centre: 'Sun' });
    controller.setText('two', 'replaced');
    expect(state().choices).toEqual({});
  });

  it('takes a choice back', async () => {
    const { controller, state, reads } = setUp();
    controller.setText('one', 'replaced');
    controller.setChoice('centre', 'Sun');
    controller.setChoice('axes', 'ICRF');
    controller.setChoice('centre', null);
    expect(state().choices).toEqual({ axes: 'ICRF' });
    expect(reads).toHaveLength(4);
  });

  it('restores text, choices, clock and plate findings of a case file', async () => {
    const { controller, state, clock, runs } = setUp();
    // Even when the clock stands there already.
    clock.set(4000);
    await controller.openFile(new Blob(['{"a case file"}']));
    await settle();
    expect(state()).toMatchObject({ text: CASE_FILE.text, choices: CASE_FILE.choices });
    runs[0].tell(states(0, 86400));
    runs[0].tell(reported(inventedReport({ findings: [support('other')] })));
    expect(clock.tdbSeconds).toBe(CASE_FILE.clockTdbSeconds);
    expect(state().plateFindings).toEqual(['moid']);
  });

  it('refuses a file that is too large to be a case, and keeps the sheet as it is', async () => {
    const { controller, state, reads } = await finished();
    await controller.openFile(new Blob([new Uint8Array(1_000_001)]));
    expect(state()).toMatchObject({ text: 'first', reportIsStale: false });
    expect(state().run).toMatchObject({ status: 'failed' });
    expect(state().run.error).toContain('1.0 MB');
    expect(reads).toEqual(['first']);
  });

  it('empties the sheet without an error', async () => {
    const { controller, state } = await finished();
    controller.setText('', 'replaced');
    await settle();
    expect(state()).toMatchObject({ reading: null, run: { status: 'idle', error: null } });
  });
});

describe('what is known stays', () => {
  it('keeps the last report, marked stale, and the text, when the new text is bad', async () => {
    const { controller, state } = await finished();
    controller.setText('bad', 'replaced');
    await settle();
    expect(state().report).not.toBeNull();
    expect(state()).toMatchObject({ text: 'bad', reportIsStale: true });
  });

  it('takes the mark away when the new report is there', async () => {
    const { controller, state, runs } = await finished();
    controller.setText('second', 'replaced');
    await settle();
    expect(state().reportIsStale).toBe(true);
    runs[1].tell(states(5, 6));
    const next = inventedReport({ fingerprint: 'ff' });
    runs[1].tell(reported(next));
    expect(state()).toMatchObject({ reportIsStale: false, report: next });
  });

  it('shows states as they come, in a trajectory of their own', async () => {
    const { controller, state, runs } = await finished();
    const before = state().trajectory;
    controller.setText('second', 'replaced');
    await settle();
    expect(state().trajectory).toBe(before);
    runs[1].tell(states(5, 6));
    expect(state().trajectory).not.toBe(before);
    expect(state().trajectory.count).toBe(2);
    runs[1].tell(states(7));
    expect(state().trajectory.count).toBe(3);
  });

  it.each(['stop', 'fail'] as const)(
    'gives the trajectory of the last report its place back after a %s',
    async (how) => {
      const { controller, state, runs } = await finished();
      const before = state().trajectory;
      controller.setText('second', 'replaced');
      await settle();
      runs[1].tell(states(5, 6));
      if (how === 'stop') controller.stop();
      else runs[1].fail(new Error('the step collapsed'));
      await settle();
      expect(state().trajectory).toBe(before);
      expect(state().report).not.toBeNull();
      expect(state().reportIsStale).toBe(true);
      expect(state().run.status).toBe(how === 'stop' ? 'stopped' : 'failed');
    },
  );

  it('says what went wrong, and after a dead worker what to do', async () => {
    const { controller, state, runs } = setUp();
    controller.setText('one', 'replaced');
    await settle();
    runs[0].fail(new WorkerDied('The worker stopped.'));
    await settle();
    expect(state().run.error).toBe('The worker stopped. Run it again to start a new worker.');
    controller.runAgain();
    await settle();
    expect(runs).toHaveLength(2);
    expect(state().run).toMatchObject({ status: 'running', error: null });
  });

  it('cancels the running assessment as soon as the text changes', async () => {
    const { controller, runs } = setUp();
    controller.setText('one', 'replaced');
    await settle();
    controller.setText('one more', 'typed');
    expect(runs[0].cancelled).toBe(true);
  });
});

describe('progress', () => {
  it('carries the figure and the note', async () => {
    const { controller, state, runs } = setUp();
    controller.setText('one', 'replaced');
    await settle();
    runs[0].tell({ type: 'progress', fraction: 0.43, note: 'integrating forward' });
    expect(state().run).toEqual({
      status: 'running',
      fraction: 0.43,
      note: 'integrating forward',
      error: null,
    });
  });

  it('keeps the figure at which it was stopped', async () => {
    const { controller, state, runs } = setUp();
    controller.setText('one', 'replaced');
    await settle();
    runs[0].tell({ type: 'progress', fraction: 0.43, note: 'x' });
    controller.stop();
    expect(runs[0].cancelled).toBe(true);
    expect(state().run).toMatchObject({ status: 'stopped', fraction: 0.43 });
  });
});

describe('the clock', () => {
  it('waits at the first state, then goes to the principal approach', async () => {
    const { controller, clock, runs } = setUp();
    controller.setText('one', 'replaced');
    await settle();
    runs[0].tell(states(100, 86400));
    expect(clock.tdbSeconds).toBe(100);
    runs[0].tell(reported());
    expect(clock.tdbSeconds).toBe(43200);
  });

  it('goes to the epoch when there is no approach', async () => {
    const { clock } = await finished(inventedReport({ approaches: [], principal: null }));
    expect(clock.tdbSeconds).toBe(0);
  });

  it('stays where the person has put it when the case is edited', async () => {
    const { controller, clock, runs } = await finished();
    clock.set(70000);
    controller.setChoice('centre', 'Sun');
    await settle();
    runs[1].tell(states(0, 86400));
    runs[1].tell(reported());
    expect(clock.tdbSeconds).toBe(70000);
  });

  it('goes to the approach of a new case even when the person had moved it', async () => {
    const { controller, clock, runs } = await finished();
    clock.set(70000);
    controller.setText('second', 'replaced');
    await settle();
    runs[1].tell(states(0, 86400));
    runs[1].tell(reported());
    expect(clock.tdbSeconds).toBe(43200);
  });

  it('does not stay outside the span of an edited case', async () => {
    const { controller, clock, runs } = await finished();
    clock.set(80000);
    controller.setChoice('spanTo', '2000-01-02');
    await settle();
    runs[1].tell(states(0, 50000));
    runs[1].tell(reported());
    expect(clock.tdbSeconds).toBe(43200);
  });

  it('stops playing when the person goes to a moment', async () => {
    const { controller, clock, store, state } = await finished();
    store.setState({ playing: true });
    controller.goTo(5);
    expect(clock.tdbSeconds).toBe(5);
    expect(state().playing).toBe(false);
  });
});

describe('what is handed over', () => {
  it('puts the first supporting findings of a new case on the plate', async () => {
    const findings = ['a', 'b', 'c', 'd', 'e', 'f', 'g'].map(support);
    const { state } = await finished(inventedReport({ findings }));
    expect(state().plateFindings).toEqual(['a', 'b', 'c', 'd', 'e']);
  });

  it('keeps the chosen findings while the case is edited', async () => {
    const findings = ['a', 'b', 'c', 'd', 'e', 'f', 'g'].map(support);
    const { controller, state, runs } = await finished(inventedReport({ findings }));
    controller.togglePlateFinding('a');
    controller.togglePlateFinding('g');
    controller.setChoice('centre', 'Sun');
    await settle();
    runs[1].tell(reported(inventedReport({ findings })));
    expect(state().plateFindings).toEqual(['b', 'c', 'd', 'e', 'g']);
  });

  it('saves what the worker writes, under its name', async () => {
    const { controller, saved, asked } = await finished();
    expect(await controller.saveFile('oem')).toBe('x.oem');
    expect(asked).toEqual([{ kind: 'oem', madeAt: '2026-03-01T00:00:00Z', desk: null }]);
    expect(saved[0].fileName).toBe('x.oem');
    expect(await saved[0].content.text()).toBe('content');
  });

  it('gives a case file all that the desk knows', async () => {
    const { controller, clock, asked } = await finished();
    controller.setChoice('centre', 'Sun');
    clock.set(12);
    await controller.saveFile('case-file');
    expect(asked[0]).toMatchObject({
      kind: 'case-file',
      desk: { text: 'first', choices: { centre: 'Sun' }, clockTdbSeconds: 12, plateFindings: [] },
    });
  });

  it('draws the plate from the report and the trajectory that belong together', async () => {
    const { controller, saved } = await finished();
    expect(await controller.savePlate()).toBe('Sample-One-invented-a1b2c3d4-plate.png');
    expect(await saved[0].content.text()).toBe(`${inventedReport().fingerprint} 2`);
  });

  it('draws no plate of a case that has been changed since', async () => {
    const { controller, saved } = await finished();
    controller.setText('bad', 'replaced');
    await settle();
    await expect(controller.savePlate()).rejects.toMatchObject({ code: 'no-report' });
    expect(saved).toEqual([]);
  });
});

describe('the estimate', () => {
  const uncertain = (changes: Partial<Report> = {}): Report => {
    const report = inventedReport(changes);
    const uncertainty = {
      sigmaDistanceKm: 1,
      sigmaTimeS: 1,
      sigmaSpeedKmS: 1,
      distance3SigmaKm: [1, 2] as [number, number],
      ellipse: null,
      stretchingEarthRadiiPerSigma: null,
    };
    return { ...report, approaches: report.approaches.map((each) => ({ ...each, uncertainty })) };
  };
  const carried = (
    count: number,
    wanted: number,
    impacts = 0,
  ): Extract<EstimateEvent, { type: 'clones' }> => ({
    type: 'clones',
    approach: 0,
    count,
    wanted,
    impacts,
    interval95: [0, 0.5],
    points: new Float32Array(7),
    drawn: 'plain',
  });

  it('follows a finished assessment with uncertainties, and not before it is done', async () => {
    const { controller, runs, estimates, state } = setUp();
    controller.setText('one', 'replaced');
    await settle();
    runs[0].tell(states(0, 86400));
    runs[0].tell(reported(uncertain()));
    await settle();
    expect(estimates).toHaveLength(0);
    runs[0].finish('done');
    await settle();
    expect(estimates.map(({ request }) => request)).toEqual([{ clones: 10_000, seed: 1 }]);
    expect(state().run.status).toBe('done');
    expect(state().estimate).toMatchObject({ status: 'running', count: 0, wanted: 10_000 });
  });

  it('does not follow an assessment without uncertainties', async () => {
    const { estimates, state } = await finished();
    expect(estimates).toHaveLength(0);
    expect(state().estimate.status).toBe('idle');
  });

  it('counts the clones and gathers their points', async () => {
    const { estimates, state } = await finished(uncertain());
    estimates[0].tell({ type: 'progress', fraction: 0.4, note: 'carrying clones' });
    estimates[0].tell(carried(4000, 10_000, 12));
    estimates[0].tell(carried(5000, 10_000, 13));
    expect(state().estimate).toEqual({
      status: 'running',
      fraction: 0.4,
      note: 'carrying clones',
      count: 5000,
      wanted: 10_000,
      impacts: 13,
      interval95: [0, 0.5],
      error: null,
    });
    expect(state().clones.points('plain')).toHaveLength(14);
  });

  it('puts its report in the place of the one it sharpens, and leaves clock and trajectory', async () => {
    const { clock, estimates, state, controller, saved } = await finished(uncertain());
    const before = state().trajectory;
    clock.set(70000);
    const sharper = uncertain({ fingerprint: 'ffffffffff' });
    estimates[0].tell(carried(10_000, 10_000));
    estimates[0].tell({ type: 'report', report: sharper });
    estimates[0].finish('done');
    await settle();
    expect(state()).toMatchObject({ report: sharper, reportIsStale: false });
    expect(state().trajectory).toBe(before);
    expect(clock.tdbSeconds).toBe(70000);
    expect(state().estimate).toMatchObject({ status: 'done', fraction: 1 });
    expect(await controller.savePlate()).toContain('ffffffff');
    expect(await saved[0].content.text()).toBe('ffffffffff 2');
  });

  it('keeps the marks of the rare-event sample only while the report speaks of it', async () => {
    const { estimates, state } = await finished(uncertain());
    estimates[0].tell(carried(10_000, 10_000));
    estimates[0].tell({ ...carried(10_000, 10_000), drawn: 'rare' });
    const counted = {
      firstOrder: null,
      dates: [],
      seed: 1,
      untilJdTdb: 2463000.5,
      reliability: null,
    };
    const rareEvent = { method: 'sampling', value: 1e-3, relativeError: 0.1, samples: 1 };
    const sampled = uncertain({ impactProbability: { ...counted, rareEvent } });
    estimates[0].tell({ type: 'report', report: sampled });
    expect(state().clones.points('rare')).toHaveLength(7);
    estimates[0].tell({ type: 'report', report: uncertain({ impactProbability: counted }) });
    expect(state().clones.points('rare')).toHaveLength(0);
    expect(state().clones.points('plain')).toHaveLength(7);
  });

  it('puts new first findings on the plate unless the person has chosen', async () => {
    const first = ['a', 'b', 'c', 'd', 'e', 'f'].map(support);
    const sharper = uncertain({ findings: [support('p'), ...first] });
    const untouched = await finished(uncertain({ findings: first }));
    untouched.estimates[0].tell({ type: 'report', report: sharper });
    expect(untouched.state().plateFindings).toEqual(['p', 'a', 'b', 'c', 'd']);
    const chosen = await finished(uncertain({ findings: first }));
    chosen.controller.togglePlateFinding('b');
    chosen.estimates[0].tell({ type: 'report', report: sharper });
    expect(chosen.state().plateFindings).toEqual(['a', 'c', 'd', 'e']);
  });

  it('can be stopped where it is, and carried on with the same seed', async () => {
    const { controller, estimates, state } = await finished(uncertain());
    estimates[0].tell(carried(4000, 10_000, 12));
    controller.stopEstimate();
    expect(estimates[0].stopped).toBe(true);
    estimates[0].tell(carried(4500, 10_000, 12));
    estimates[0].finish('done');
    await settle();
    expect(state().estimate).toMatchObject({ status: 'stopped', count: 4500, impacts: 12 });
    controller.continueEstimate(100_000);
    expect(estimates[1].request).toEqual({ clones: 100_000, seed: 1 });
    expect(state().estimate).toMatchObject({ status: 'running', count: 4500, wanted: 100_000 });
  });

  it('is not started twice', async () => {
    const { controller, estimates } = await finished(uncertain());
    controller.continueEstimate(100_000);
    expect(estimates).toHaveLength(1);
  });

  it.each(['typed', 'replaced'] as const)(
    'is cancelled at once when the text is %s',
    async (how) => {
      const { controller, estimates, state } = await finished(uncertain());
      estimates[0].tell(carried(4000, 10_000));
      const cloud = state().clones;
      controller.setText('first, changed', how);
      expect(estimates[0].cancelled).toBe(true);
      await settle();
      expect(state().estimate).toMatchObject({ status: 'stopped', count: 4000 });
      // What is shown belongs together: the clones stay with the old report.
      expect(state().clones).toBe(cloud);
      controller.continueEstimate(100_000);
      expect(estimates).toHaveLength(1);
    },
  );

  it('gives a new case a cloud and counts of its own', async () => {
    const { controller, runs, estimates, state } = await finished(uncertain());
    estimates[0].tell(carried(4000, 10_000, 3));
    controller.setText('second', 'replaced');
    await settle();
    runs[1].tell(states(0, 86400));
    runs[1].tell(reported(uncertain()));
    expect(state().estimate).toMatchObject({ status: 'idle', count: 0, impacts: 0 });
    expect(state().clones.points('plain')).toHaveLength(0);
  });

  it('says what went wrong and keeps what is known', async () => {
    const { controller, estimates, state } = await finished(uncertain());
    estimates[0].tell(carried(4000, 10_000));
    estimates[0].fail(new Error('A batch of clones was lost twice.'));
    await settle();
    expect(state().estimate).toMatchObject({
      status: 'failed',
      count: 4000,
      error: 'A batch of clones was lost twice.',
    });
    expect(state().run.status).toBe('done');
    controller.continueEstimate(10_000);
    expect(estimates).toHaveLength(2);
  });

  it('offers a new run when the worker died with it', async () => {
    const { estimates, state } = await finished(uncertain());
    estimates[0].fail(new WorkerDied('The worker stopped.'));
    await settle();
    expect(state().run.status).toBe('failed');
    expect(state().report).not.toBeNull();
  });
});
