import type { Report } from '../../core/report/report';
import type { DeskStore } from '../store/store';
import type { Trajectory } from '../worker/trajectory';

/** The trajectory that stood in the store when a report came in: the two are set in one step. */
const trajectoryOf = new WeakMap<Report, Trajectory>();

/**
 * The report, if the trajectory in the store is its own. While a new case streams in, the report of
 * the case before still stands in the findings but says nothing about the states being drawn.
 */
export function reportOfTrajectory({
  report,
  trajectory,
}: Pick<DeskStore, 'report' | 'trajectory'>): Report | null {
  if (report === null) return null;
  const own = trajectoryOf.get(report) ?? trajectory;
  trajectoryOf.set(report, own);
  return own === trajectory ? report : null;
}

const firstOf = new WeakMap<Trajectory, Report>();

/**
 * The first report of the trajectory in the store. One that clones have made sharper has the same
 * approaches and crossings: what is drawn of these alone need not be drawn anew.
 */
export function firstReportOfTrajectory(
  state: Pick<DeskStore, 'report' | 'trajectory'>,
): Report | null {
  const report = reportOfTrajectory(state);
  if (report === null) return null;
  const first = firstOf.get(state.trajectory) ?? report;
  firstOf.set(state.trajectory, first);
  return first;
}
