import type { Choices, FieldName, OrbitCase, ReadResult } from '../../core/case/types';
import type { Report } from '../../core/report/report';
import type { Clock } from '../store/clock';
import { type DeskStoreApi, type EstimateState, IDLE_ESTIMATE, IDLE_RUN } from '../store/store';
import { type Assessment, type EstimateRun, type WorkerClient, WorkerDied } from '../worker/client';
import { CloneCloud } from '../worker/clone-cloud';
import { fileStem } from '../worker/file-name';
import type { DeskState, ExportKind } from '../worker/messages';
import { Spread } from '../worker/spread';
import { Trajectory } from '../worker/trajectory';

/** How long typing must rest before the text is read, ms. */
const TYPING_REST_MS = 120;
/** A case is a short text; a larger file was not meant for the sheet. */
const LARGEST_FILE_BYTES = 1_000_000;
/** How many clones a new case carries by itself. */
const CLONES_AT_FIRST = 10_000;
/** The same case gives the same estimate on every machine; the report names the seed. */
export const ESTIMATE_SEED = 1;
/** How many supporting findings a new case puts on the plate by itself. */
const FINDINGS_ON_PLATE = 5;

/** Typed letter by letter, or put there as a whole (pasted, dropped, opened, picked). */
export type TextSource = 'typed' | 'replaced';

export interface ControllerDeps {
  store: DeskStoreApi;
  clock: Clock;
  client: WorkerClient;
  /** The time of making, ISO 8601 UTC. */
  now(): string;
  /** Draws the plate of a report with what the desk shows now. */
  drawPlate(report: Report, trajectory: Trajectory): Promise<Blob>;
  /** Hands a file to the person. */
  save(fileName: string, content: Blob): void;
}

/** There is no report of the case on the sheet yet. */
class NoReport extends Error {
  readonly code = 'no-report';
  override name = 'NoReport';
}

/** A file that cannot be a case. */
class FileTooLarge extends Error {
  readonly code = 'file-too-large';

  constructor(bytes: number) {
    super(
      `The file has ${(bytes / 1e6).toFixed(1)} MB; a case is a text of at most ${LARGEST_FILE_BYTES / 1e6} MB. Drop the file that holds the orbit.`,
    );
    this.name = 'FileTooLarge';
  }
}

/** What the person can do; every action of the desk goes through here. */
export interface Controller {
  setText(text: string, source: TextSource): void;
  /** Sets a field by hand; null takes the hand away again. */
  setChoice(field: FieldName, value: string | null): void;
  /** Takes the text of a file as the case; one that is too large is refused in words. */
  openFile(file: Blob): Promise<void>;
  stop(): void;
  runAgain(): void;
  /** Ends the carrying of clones with what is known so far. */
  stopEstimate(): void;
  /** Carries clones until there are so many in all. */
  continueEstimate(clones: number): void;
  goTo(tdbSeconds: number): void;
  togglePlateFinding(id: string): void;
  /** Writes a file and gives its name; rejects with a sentence when there is nothing to write. */
  saveFile(kind: ExportKind): Promise<string>;
  savePlate(): Promise<string>;
}

interface Shown {
  report: Report | null;
  trajectory: Trajectory;
}

/**
 * Carries the person's text to a report: reads it, runs what is complete, streams the states into
 * the store; where there is a covariance, clones follow, and a report with what they say. The last good report stays, marked stale, until the next one is there; a run that is
 * stopped or fails gives its place back to the trajectory of that report, so that what the page
 * shows always belongs together.
 */
export function createController(deps: ControllerDeps): Controller {
  const { store, clock, client, now } = deps;
  /** Counts changes of the case: an answer to an older one is dropped. */
  let turn = 0;
  let run: Assessment | null = null;
  let estimate: EstimateRun | null = null;
  /** The person has asked the estimate to end where it is. */
  let stopping = false;
  let typing: ReturnType<typeof setTimeout> | undefined;
  let shown: Shown = { report: null, trajectory: store.getState().trajectory };
  /** The case is a new one, not a change of the one before: the plate's findings start afresh. */
  let isNewCase = true;
  let personMovedClock = false;
  let settingClock = false;

  clock.subscribe(() => {
    if (!settingClock) personMovedClock = true;
  });

  function setClock(tdbSeconds: number): void {
    settingClock = true;
    clock.set(tdbSeconds);
    settingClock = false;
  }

  /** Drops what is under way for the case before; its findings stay, marked. */
  function leaveCase(): void {
    turn += 1;
    clearTimeout(typing);
    run?.cancel();
    run = null;
    leaveEstimate();
    store.setState({
      run: { ...IDLE_RUN, status: 'reading' },
      trajectory: shown.trajectory,
      reportIsStale: shown.report !== null,
    });
  }

  function leaveEstimate(): void {
    if (estimate === null) return;
    estimate.cancel();
    estimate = null;
    setEstimate({ status: 'stopped', note: '' });
  }

  function fail(error: unknown): void {
    store.setState({ run: { ...IDLE_RUN, status: 'failed', error: inWords(error) } });
  }

  /** Takes what a case file says of the desk; a file without a text keeps its own as the text. */
  function restore(desk: DeskState): void {
    const { text, choices, clockTdbSeconds, plateFindings } = desk;
    store.setState({ choices, plateFindings, ...(text === '' ? {} : { text }) });
    isNewCase = false;
    if (clockTdbSeconds === null) return;
    setClock(clockTdbSeconds);
    personMovedClock = true;
  }

  async function read(): Promise<void> {
    const mine = turn;
    const { text, choices } = store.getState();
    if (text.trim() === '') {
      store.setState({ reading: null, run: IDLE_RUN });
      return;
    }
    try {
      const answer = await client.read(text, choices);
      if (mine !== turn) return;
      const { desk, result } = answer;
      if (desk !== null && isNewCase) {
        restore(desk);
        if (desk.text !== '') return read();
      }
      store.setState({ reading: result, run: IDLE_RUN });
      if (result.case !== null) await assess(text, result, result.case);
    } catch (error) {
      if (mine !== turn) return;
      store.setState({ trajectory: shown.trajectory });
      fail(error);
    }
  }

  async function assess(text: string, reading: ReadResult, orbit: OrbitCase): Promise<void> {
    const trajectory = new Trajectory();
    let spread: Spread | null = null;
    store.setState({ run: { ...IDLE_RUN, status: 'running' } });
    const own = client.assess({ text, reading, case: orbit, madeAt: now() }, (event) => {
      if (event.type === 'progress') {
        const { fraction, note } = event;
        store.setState({ run: { status: 'running', fraction, note, error: null } });
      } else if (event.type === 'report') {
        show({ report: event.report, trajectory, spread });
      } else if (event.type === 'spread') {
        spread = new Spread(event.rows);
      } else {
        trajectory.append(event.direction, event.samples);
        // The trajectory grows in place; setting it tells those who watch its version.
        store.setState({ trajectory });
        if (trajectory.version === 1 && !personMovedClock) setClock(trajectory.fromTdbSeconds);
      }
    });
    run = own;
    const outcome = await own.outcome.finally(() => {
      if (run === own) run = null;
    });
    if (outcome !== 'done') return;
    store.setState({ run: { ...IDLE_RUN, status: 'done', fraction: 1 } });
    const isUncertain = shown.report?.approaches.some((each) => each.uncertainty !== undefined);
    if (isUncertain === true) void carryClones(CLONES_AT_FIRST);
  }

  function setEstimate(change: Partial<EstimateState>): void {
    store.setState({ estimate: { ...store.getState().estimate, ...change } });
  }

  /** Carries clones of the report shown until there are so many; never rejects. */
  async function carryClones(wanted: number): Promise<void> {
    stopping = false;
    setEstimate({ status: 'running', fraction: 0, note: '', wanted, error: null });
    const own = client.estimate({ clones: wanted, seed: ESTIMATE_SEED }, (event) => {
      if (event.type === 'progress') {
        setEstimate({ fraction: event.fraction, note: event.note });
      } else if (event.type === 'clones') {
        const { count, impacts, interval95 } = event;
        const { clones } = store.getState();
        clones.append(event.drawn, event.points);
        // The cloud grows in place; setting it tells those who watch its version.
        store.setState({ clones });
        setEstimate({ count, wanted: event.wanted, impacts, interval95 });
      } else {
        sharpen(event.report);
      }
    });
    estimate = own;
    try {
      const outcome = await own.outcome;
      if (outcome === 'cancelled') return;
      setEstimate(
        stopping ? { status: 'stopped', note: '' } : { status: 'done', note: '', fraction: 1 },
      );
    } catch (error) {
      if (estimate !== own) return;
      setEstimate({ status: 'failed', note: '', error: inWords(error) });
      // The assessment is lost with its worker.
      if (error instanceof WorkerDied) fail(error);
    } finally {
      if (estimate === own) estimate = null;
    }
  }

  /** Whether the plate's findings are still those that the shown report put there by itself. */
  function isPlateUntouched(): boolean {
    const before = shown.report === null ? [] : firstFindings(shown.report);
    return before.join() === store.getState().plateFindings.join();
  }

  /** Puts the report with the estimate in the place of the one it continues. */
  function sharpen(report: Report): void {
    const untouched = isPlateUntouched();
    shown = { report, trajectory: shown.trajectory };
    const { clones } = store.getState();
    // Where the clones are now counted the report says nothing of the sample any more.
    const isCounted = report.impactProbability?.rareEvent === undefined;
    if (isCounted && clones.points('rare').length > 0) {
      store.setState({ clones: clones.withoutRare() });
    }
    store.setState({ report, ...(untouched ? { plateFindings: firstFindings(report) } : {}) });
  }

  function show(next: Shown & { report: Report; spread: Spread | null }): void {
    const ownFindings = isNewCase || isPlateUntouched();
    shown = next;
    const { report, trajectory, spread } = next;
    store.setState({
      report,
      trajectory,
      spread,
      reportIsStale: false,
      clones: new CloneCloud(),
      estimate: IDLE_ESTIMATE,
      ...(ownFindings ? { plateFindings: firstFindings(report) } : {}),
    });
    isNewCase = false;
    const at = clock.tdbSeconds;
    const outside = at < trajectory.fromTdbSeconds || at > trajectory.toTdbSeconds;
    if (personMovedClock && !outside) return;
    const principal = report.principal === null ? null : report.approaches[report.principal];
    // An impact ends on the surface: the periapsis it aims at is never reached.
    setClock(
      principal?.surfaceImpact?.tdbSeconds ??
        principal?.tdbSeconds ??
        report.case.normalised.epochTdbSeconds,
    );
    personMovedClock = false;
  }

  const controller: Controller = {
    setText(text, source) {
      if (source === 'replaced') {
        isNewCase = true;
        personMovedClock = false;
        store.setState({ choices: {}, playing: false });
      }
      store.setState({ text });
      leaveCase();
      if (source === 'replaced') void read();
      else typing = setTimeout(() => void read(), TYPING_REST_MS);
    },
    setChoice(field, value) {
      const choices: Choices = { ...store.getState().choices };
      if (value === null) delete choices[field];
      else choices[field] = value;
      store.setState({ choices });
      leaveCase();
      void read();
    },
    async openFile(file) {
      if (file.size > LARGEST_FILE_BYTES) {
        fail(new FileTooLarge(file.size));
        return;
      }
      controller.setText(await file.text(), 'replaced');
    },
    stop() {
      if (run === null) return;
      const { fraction, note } = store.getState().run;
      leaveCase();
      store.setState({ run: { status: 'stopped', fraction, note, error: null } });
    },
    runAgain() {
      leaveCase();
      void read();
    },
    stopEstimate() {
      stopping = true;
      estimate?.stop();
    },
    continueEstimate(clones) {
      if (estimate !== null || shown.report === null || store.getState().reportIsStale) return;
      void carryClones(clones);
    },
    goTo(tdbSeconds) {
      store.setState({ playing: false });
      clock.set(tdbSeconds);
    },
    togglePlateFinding(id) {
      const { plateFindings } = store.getState();
      store.setState({
        plateFindings: plateFindings.includes(id)
          ? plateFindings.filter((each) => each !== id)
          : [...plateFindings, id],
      });
    },
    async saveFile(kind) {
      const { text, choices, plateFindings } = store.getState();
      const desk = { text, choices, clockTdbSeconds: clock.tdbSeconds, plateFindings };
      const file = await client.exportFile(kind, now(), kind === 'case-file' ? desk : null);
      deps.save(file.fileName, new Blob([file.text], { type: file.mediaType }));
      return file.fileName;
    },
    async savePlate() {
      const { report, trajectory } = shown;
      if (report === null || store.getState().reportIsStale) {
        throw new NoReport('The plate needs a finished assessment of the case on the sheet.');
      }
      const fileName = `${fileStem(report)}-plate.png`;
      deps.save(fileName, await deps.drawPlate(report, trajectory));
      return fileName;
    },
  };
  return controller;
}

function inWords(error: unknown): string {
  const message = error instanceof Error ? error.message : String(error);
  return error instanceof WorkerDied ? `${message} Run it again to start a new worker.` : message;
}

function firstFindings(report: Report): string[] {
  return report.findings
    .filter((finding) => finding.kind === 'support')
    .slice(0, FINDINGS_ON_PLATE)
    .map((finding) => finding.id);
}
