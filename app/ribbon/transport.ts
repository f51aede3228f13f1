import type { DeskContext } from '../store/context';
import { eventsOf } from './events';
import { reportOfTrajectory } from './shown-report';

/** Two instants nearer than this are the same place on the clock, s. */
const SAME_INSTANT_S = 1e-3;

/** Starts or stops the clock's play; from the end of the path it starts again at the beginning. */
export function togglePlaying({ store, clock }: DeskContext): void {
  const { playing, trajectory } = store.getState();
  if (playing) {
    store.setState({ playing: false });
    return;
  }
  if (trajectory.count < 2) return;
  if (clock.tdbSeconds >= trajectory.toTdbSeconds - SAME_INSTANT_S) {
    clock.set(trajectory.fromTdbSeconds);
  }
  store.setState({ playing: true });
}

/** Sets the clock to the next event (1) or the one before (−1), if there is one, and stops play. */
export function jumpToEvent({ store, clock }: DeskContext, direction: 1 | -1): void {
  const report = reportOfTrajectory(store.getState());
  if (report === null) return;
  const now = clock.tdbSeconds;
  const events = eventsOf(report);
  const next =
    direction === 1
      ? events.find(({ tdbSeconds }) => tdbSeconds > now + SAME_INSTANT_S)
      : events.findLast(({ tdbSeconds }) => tdbSeconds < now - SAME_INSTANT_S);
  if (next === undefined) return;
  store.setState({ playing: false });
  clock.set(next.tdbSeconds);
}
