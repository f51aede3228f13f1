import { useEffect, useMemo, useState } from 'react';
import { useDesk, useDeskStore } from '../store/context';
import { FONT_TEXT } from '../theme/tokens';
import { type RibbonGeometry, ribbonGeometry } from './geometry';
import { firstReportOfTrajectory, reportOfTrajectory } from './shown-report';

/** Size of the small text in the ribbon, px; the style sheet says the same. */
const TEXT_PX = 11;
/** Least time between two drawings of the curve while states stream in, ms. */
const REDRAW_MS = 100;

/** Height of the ribbon's sheet, px. */
export const RIBBON_HEIGHT_PX = 158;

/** The ribbon of what the store holds; drawn anew as states come, no oftener than it can be read. */
export function useRibbonGeometry(widthPx: number): RibbonGeometry | null {
  const trajectory = useDeskStore((state) => state.trajectory);
  const report = useDeskStore(firstReportOfTrajectory);
  const spread = useDeskStore((state) =>
    reportOfTrajectory(state) === null ? null : state.spread,
  );
  const kind = useDeskStore((state) => state.ribbonTime);
  const version = useSlowVersion();
  const fonts = useFontsLoaded();
  return useMemo(() => {
    // Named so that the geometry is made anew when the trajectory has grown or the type has come.
    const drawing = { version, fonts };
    if (widthPx === 0 || drawing.version < 0) return null;
    return ribbonGeometry(report, trajectory, spread, kind, {
      widthPx,
      heightPx: RIBBON_HEIGHT_PX,
      leftPx: 112,
      rightPx: 88,
      topPx: 4,
      bottomPx: 34,
      rowPx: TEXT_PX + 1,
      measure: createMeasure(`400 ${TEXT_PX}px ${FONT_TEXT}`),
    });
  }, [report, trajectory, spread, kind, widthPx, version, fonts]);
}

/** The trajectory's version, told at most every REDRAW_MS. */
function useSlowVersion(): number {
  const { store } = useDesk();
  const [version, setVersion] = useState(() => store.getState().trajectory.version);
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    const read = () => {
      timer = undefined;
      setVersion(store.getState().trajectory.version);
    };
    const stop = store.subscribe((state, before) => {
      const same = state.trajectory === before.trajectory && state.run === before.run;
      if (!same) timer ??= setTimeout(read, REDRAW_MS);
    });
    read();
    return () => {
      stop();
      clearTimeout(timer);
    };
  }, [store]);
  return version;
}

function useFontsLoaded(): boolean {
  const [loaded, setLoaded] = useState(false);
  useEffect(() => {
    let gone = false;
    void document.fonts.ready.then(() => {
      if (!gone) setLoaded(true);
    });
    return () => {
      gone = true;
    };
  }, []);
  return loaded;
}

function createMeasure(font: string): (text: string) => number {
  const context = document.createElement('canvas').getContext('2d');
  if (context === null) return (text) => text.length * TEXT_PX * 0.5;
  context.font = font;
  return (text) => context.measureText(text).width;
}
