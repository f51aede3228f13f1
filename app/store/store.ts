import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Choices, ReadResult } from '../../core/case/types';
import type { Report } from '../../core/report/report';
import { CloneCloud } from '../worker/clone-cloud';
import type { Spread } from '../worker/spread';
import { Trajectory } from '../worker/trajectory';

/** Slow intent: what the person asked for and what has come back. No per-frame state. */

export type Theme = 'auto' | 'paper' | 'night';
export type StageLayout = 'both' | 'sun' | 'earth';
export type Station = 'north-pole' | 'along-approach' | 'edge-on' | 'riding';
export type RibbonTime = 'stretched' | 'linear';

export type RunStatus = 'idle' | 'reading' | 'running' | 'done' | 'failed' | 'stopped';

export interface RunState {
  status: RunStatus;
  /** Share of the span done, 0 to 1. */
  fraction: number;
  note: string;
  /** What went wrong, in a sentence; null unless status is 'failed'. */
  error: string | null;
}

export interface EstimateState {
  status: 'idle' | 'running' | 'stopped' | 'done' | 'failed';
  /** Share done, 0 to 1, and what is being done. */
  fraction: number;
  note: string;
  count: number;
  wanted: number;
  impacts: number;
  interval95: [number, number] | null;
  /** What went wrong, in a sentence; null unless status is 'failed'. */
  error: string | null;
}

export interface NamedDistances {
  sphereOfInfluence: boolean;
  moonDistance: boolean;
  geosynchronous: boolean;
}

export interface DeskStore {
  /** The pasted text. Kept in a case file. */
  text: string;
  /** Fields set by hand. Kept in a case file. */
  choices: Choices;
  reading: ReadResult | null;
  run: RunState;
  /** The last good report: stays while a new case is read or fails. */
  report: Report | null;
  /** The text and reading belong to a newer case than the report does. */
  reportIsStale: boolean;
  /** Streamed states of the current run; a new object for each run. Mutable: watch `version`. */
  trajectory: Trajectory;
  /** Where the report's object may be at each moment; null without a covariance. */
  spread: Spread | null;
  /** Clones of the principal approach; a new object for each case. Mutable: watch `version`. */
  clones: CloneCloud;
  /** The estimate of the impact probability that follows the assessment. */
  estimate: EstimateState;
  /** Ids of the findings chosen for the plate. Kept in a case file. */
  plateFindings: string[];
  playing: boolean;
  theme: Theme;
  stageLayout: StageLayout;
  sunStation: Station;
  earthStation: Station;
  namedDistances: NamedDistances;
  showUnperturbed: boolean;
  showSpread: boolean;
  ribbonTime: RibbonTime;
  sheetOpen: boolean;
}

export type DeskStoreApi = StoreApi<DeskStore>;

export const IDLE_RUN: RunState = { status: 'idle', fraction: 0, note: '', error: null };

export const IDLE_ESTIMATE: EstimateState = {
  status: 'idle',
  fraction: 0,
  note: '',
  count: 0,
  wanted: 0,
  impacts: 0,
  interval95: null,
  error: null,
};

export function createDeskStore(initial: Partial<DeskStore> = {}): DeskStoreApi {
  return createStore<DeskStore>(() => ({
    text: '',
    choices: {},
    reading: null,
    run: IDLE_RUN,
    report: null,
    reportIsStale: false,
    trajectory: new Trajectory(),
    spread: null,
    clones: new CloneCloud(),
    estimate: IDLE_ESTIMATE,
    plateFindings: [],
    playing: false,
    theme: 'auto',
    stageLayout: 'both',
    sunStation: 'north-pole',
    earthStation: 'north-pole',
    namedDistances: { sphereOfInfluence: true, moonDistance: true, geosynchronous: true },
    showUnperturbed: true,
    showSpread: true,
    ribbonTime: 'stretched',
    sheetOpen: true,
    ...initial,
  }));
}
