import { useEffect, useRef } from 'react';
import type { SceneName } from '../plate/scene-source';
import { useDesk } from '../store/context';
import { SAMPLE } from '../worker/core-values';
import { readingsOf } from './readings';

/** Rows there is room for. */
const ROWS = 5;
/** Figures that change faster than this cannot be read, ms. */
const LEAST_MS = 80;

/** The figures at the clock; written into the page directly, without a render. */
export function Readings({ scene }: { scene: SceneName }) {
  const desk = useDesk();
  const list = useRef<HTMLDListElement>(null);

  useEffect(() => {
    const { store, clock } = desk;
    const sample = new Float64Array(SAMPLE.stride);
    let timer: ReturnType<typeof setTimeout> | undefined;
    const write = () => {
      timer = undefined;
      const rows = list.current?.children;
      if (rows === undefined) return;
      const known = store.getState().trajectory.at(clock.tdbSeconds, sample);
      const readings = known ? readingsOf(scene, sample) : [];
      for (let i = 0; i < rows.length; i++) {
        const [term, figure] = rows[i].children;
        setText(term, readings[i]?.label ?? '');
        setText(figure, readings[i]?.text ?? '');
      }
    };
    const soon = () => {
      timer ??= setTimeout(write, LEAST_MS);
    };
    const stops = [
      clock.subscribe(soon),
      store.subscribe((state, before) => {
        if (state.trajectory !== before.trajectory || state.run !== before.run) soon();
      }),
    ];
    write();
    return () => {
      for (const stop of stops) stop();
      clearTimeout(timer);
    };
  }, [desk, scene]);

  return (
    <dl className="scene-readings" ref={list}>
      {Array.from({ length: ROWS }, (_, row) => (
        // biome-ignore lint/suspicious/noArrayIndexKey: the rows are places, not items
        <div key={row}>
          <dt />
          <dd className="figures" />
        </div>
      ))}
    </dl>
  );
}

function setText(element: Element, text: string): void {
  if (element.textContent !== text) element.textContent = text;
}
