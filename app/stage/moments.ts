import type { Report } from '../../core/report/report';
import { reportOfTrajectory } from '../ribbon/shown-report';
import type { DeskStoreApi } from '../store/store';
import { SAMPLE } from '../worker/core-values';
import type { Trajectory } from '../worker/trajectory';
import { type Encounter, encounterOf } from './encounter';
import type { Moment } from './sheet';

/** Moments of the case on the desk; what does not change with the clock is worked out once. */
export class Moments {
  private readonly sample = new Float64Array(SAMPLE.stride);
  private known: {
    trajectory: Trajectory;
    version: number;
    report: Report | null;
    encounter: Encounter;
  } | null = null;

  constructor(private readonly store: DeskStoreApi) {}

  /** What there is to draw at an instant; null while no states have come. The sample is reused. */
  at(tdbSeconds: number): Moment | null {
    const state = this.store.getState();
    const { trajectory, namedDistances, showUnperturbed } = state;
    if (!trajectory.at(tdbSeconds, this.sample)) return null;
    const report = reportOfTrajectory(state);
    const { known } = this;
    if (
      known?.trajectory !== trajectory ||
      known.version !== trajectory.version ||
      known.report !== report
    ) {
      const encounter = encounterOf(report, trajectory);
      this.known = { trajectory, version: trajectory.version, report, encounter };
    }
    const encounter = this.known?.encounter ?? encounterOf(report, trajectory);
    const spread = report === null || !state.showSpread ? null : state.spread;
    const { sample } = this;
    return { trajectory, sample, report, encounter, namedDistances, showUnperturbed, spread };
  }
}
