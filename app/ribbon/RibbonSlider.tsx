import { type KeyboardEvent, type PointerEvent, useEffect, useRef } from 'react';
import { useDesk } from '../store/context';
import { SAMPLE } from '../worker/core-values';
import { clockReading } from './clock-reading';
import { distanceIn } from './curve';
import type { RibbonGeometry } from './geometry';
import { RibbonPlot } from './RibbonPlot';
import { keyMove } from './slider-keys';
import { jumpToEvent } from './transport';
import { RIBBON_HEIGHT_PX } from './use-ribbon-geometry';

/** Coordinates a screen reader hears are thousandths of the ribbon. */
const VALUE_MAX = 1000;
/** Least time between two spoken texts while the clock runs, ms. */
const SPEAK_MS = 500;
/** Part of the ribbon for a pixel of the wheel. */
const WHEEL_UNIT = 1 / 6000;

const clamped = (unit: number): number => Math.min(1, Math.max(0, unit));

/** The curve as a slider: drag, wheel and keys set the clock. */
export function RibbonSlider({ geometry, widthPx }: { geometry: RibbonGeometry; widthPx: number }) {
  const { store, clock } = useDesk();
  const slider = useRef<HTMLDivElement>(null);
  const line = useRef<SVGPathElement>(null);
  const dot = useRef<SVGCircleElement>(null);
  const { time, plot, distance, anchor, flags } = geometry;

  function goTo(unit: number): void {
    store.setState({ playing: false });
    const at = clamped(unit);
    clock.set(at === 1 ? time.toTdbSeconds : at === 0 ? time.fromTdbSeconds : time.timeAt(at));
  }

  useEffect(() => {
    const scratch = new Float64Array(SAMPLE.stride);
    let spokenAt = 0;
    let speakLater: ReturnType<typeof setTimeout> | undefined;
    const speak = () => {
      speakLater = undefined;
      spokenAt = performance.now();
      const reading = clockReading(store.getState().trajectory, anchor, clock.tdbSeconds);
      const unit = clamped(time.unitAt(clock.tdbSeconds));
      slider.current?.setAttribute('aria-valuenow', (unit * VALUE_MAX).toFixed(1));
      slider.current?.setAttribute('aria-valuetext', reading?.spoken ?? '');
    };
    const draw = () => {
      const { trajectory, playing } = store.getState();
      const unit = clamped(time.unitAt(clock.tdbSeconds));
      const x = plot.x0 + unit * (plot.x1 - plot.x0);
      line.current?.setAttribute('d', `M${x} ${plot.y0}V${plot.y1 + 5}`);
      if (trajectory.at(clock.tdbSeconds, scratch)) {
        const height = distance.unitAt(distanceIn(scratch, 'object'));
        dot.current?.setAttribute('cx', String(x));
        dot.current?.setAttribute('cy', String(plot.y1 - height * (plot.y1 - plot.y0)));
      }
      if (!playing) speak();
      else speakLater ??= setTimeout(speak, Math.max(0, spokenAt + SPEAK_MS - performance.now()));
    };
    draw();
    const stop = clock.subscribe(draw);
    return () => {
      stop();
      clearTimeout(speakLater);
    };
  }, [store, clock, time, plot, distance, anchor]);

  useEffect(() => {
    const element = slider.current;
    if (element === null) return;
    const nudge = (event: WheelEvent) => {
      const sideways = Math.abs(event.deltaX) > Math.abs(event.deltaY);
      const page = document.documentElement;
      // Where the page itself scrolls, the wheel stays with the page.
      if (!sideways && page.scrollHeight > page.clientHeight) return;
      event.preventDefault();
      const lines = event.deltaMode === WheelEvent.DOM_DELTA_LINE ? 16 : 1;
      const delta = (sideways ? event.deltaX : event.deltaY) * lines;
      store.setState({ playing: false });
      clock.set(time.timeAt(clamped(time.unitAt(clock.tdbSeconds) + delta * WHEEL_UNIT)));
    };
    element.addEventListener('wheel', nudge, { passive: false });
    return () => element.removeEventListener('wheel', nudge);
  }, [store, clock, time]);

  function unitUnder(event: PointerEvent<HTMLDivElement>): number {
    const left = event.currentTarget.getBoundingClientRect().left;
    return (event.clientX - left - plot.x0) / (plot.x1 - plot.x0);
  }

  function press(event: PointerEvent<HTMLDivElement>): void {
    if (event.button !== 0) return;
    const target = event.target instanceof Element ? event.target.closest('[data-event]') : null;
    const flag = target === null ? undefined : flags[Number(target.getAttribute('data-event'))];
    if (flag !== undefined) {
      store.setState({ playing: false });
      clock.set(flag.event.tdbSeconds);
      return;
    }
    event.currentTarget.setPointerCapture(event.pointerId);
    goTo(unitUnder(event));
  }

  function key(event: KeyboardEvent): void {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.key === '[' || event.key === ']') {
      jumpToEvent({ store, clock }, event.key === ']' ? 1 : -1);
    } else {
      const next = keyMove(event.key, event.shiftKey, clamped(time.unitAt(clock.tdbSeconds)));
      if (next === null) return;
      goTo(next);
    }
    event.preventDefault();
  }

  return (
    <div
      ref={slider}
      className="ribbon-slider"
      role="slider"
      tabIndex={0}
      aria-label="Time along the approach"
      aria-orientation="horizontal"
      aria-valuemin={0}
      aria-valuemax={VALUE_MAX}
      aria-valuenow={0}
      onKeyDown={key}
      onPointerDown={press}
      onPointerMove={(event) => {
        if (event.currentTarget.hasPointerCapture(event.pointerId)) goTo(unitUnder(event));
      }}
    >
      <svg width={widthPx} height={RIBBON_HEIGHT_PX} aria-hidden="true" focusable="false">
        <RibbonPlot geometry={geometry} />
      </svg>
      <svg
        className="ribbon-moving"
        width={widthPx}
        height={RIBBON_HEIGHT_PX}
        aria-hidden="true"
        focusable="false"
      >
        <path ref={line} className="ribbon-playhead" />
        <circle ref={dot} className="ribbon-dot" r={4.5} />
      </svg>
    </div>
  );
}
