import { useEffect, useRef } from 'react';
import { useDesk, useDeskStore } from '../store/context';
import { advance, type Pace, REDUCED_STEP } from './pace';
import type { TimeScale } from './time-scale';

/** A frame that comes later than this (a hidden page) counts as this long, s. */
const LONGEST_FRAME_S = 0.5;

/** Moves the clock along the ribbon while the desk plays; the frame loop runs only then. */
export function usePlay(scale: TimeScale | null, pace: Pace): void {
  const { store, clock } = useDesk();
  const playing = useDeskStore((state) => state.playing);
  const latest = useRef({ scale, pace });
  useEffect(() => {
    latest.current = { scale, pace };
  }, [scale, pace]);

  useEffect(() => {
    if (!playing) return;
    const step = matchMedia('(prefers-reduced-motion: reduce)').matches ? REDUCED_STEP : 0;
    let frame = 0;
    let last: number | null = null;
    let carried = 0;
    const run = (nowMs: number) => {
      frame = requestAnimationFrame(run);
      const { scale, pace } = latest.current;
      const elapsed = last === null ? 0 : Math.min((nowMs - last) / 1000, LONGEST_FRAME_S);
      last = nowMs;
      if (scale === null) return;
      const unit = Math.max(0, scale.unitAt(clock.tdbSeconds));
      const next = advance(unit, elapsed, pace, carried, step);
      carried = next.carried;
      if (next.unit !== unit) {
        clock.set(next.unit >= 1 ? scale.toTdbSeconds : scale.timeAt(next.unit));
      }
      if (next.unit >= 1) store.setState({ playing: false });
    };
    frame = requestAnimationFrame(run);
    return () => cancelAnimationFrame(frame);
  }, [playing, store, clock]);
}
