import { useEffect, useMemo, useRef } from 'react';
import { utcWords } from '../desk/figures';
import { useDesk, useDeskStore } from '../store/context';
import { eventsOf } from './events';
import { reportOfTrajectory } from './shown-report';
import { distanceWords } from './words';

/** A fold that lists every event and goes to the one that is chosen. */
export function EventMenu() {
  const { store, clock } = useDesk();
  const report = useDeskStore(reportOfTrajectory);
  const events = useMemo(() => (report === null ? [] : eventsOf(report)), [report]);
  const fold = useRef<HTMLDetailsElement>(null);

  function close(): void {
    if (fold.current !== null) fold.current.open = false;
  }

  useEffect(() => {
    const away = (event: PointerEvent) => {
      const outside = event.target instanceof Node && !fold.current?.contains(event.target);
      if (outside && fold.current !== null) fold.current.open = false;
    };
    document.addEventListener('pointerdown', away);
    return () => document.removeEventListener('pointerdown', away);
  }, []);

  if (events.length === 0) return null;
  return (
    <details
      ref={fold}
      className="fold ribbon-events"
      onKeyDown={(event) => {
        if (event.key !== 'Escape' || fold.current?.open !== true) return;
        close();
        fold.current.querySelector('summary')?.focus();
      }}
    >
      <summary>Events</summary>
      <ol className="ribbon-event-list">
        {events.map(({ tdbSeconds, utc, label, distanceKm, kind }) => (
          <li key={`${tdbSeconds} ${label}`}>
            <button
              type="button"
              onClick={() => {
                store.setState({ playing: false });
                clock.set(tdbSeconds);
                close();
                fold.current?.querySelector('summary')?.focus();
              }}
            >
              <span className="figures">{utcWords(utc)}</span>
              <span>{label}</span>
              <span className="figures ribbon-event-km">
                {kind === 'approach' ? distanceWords(distanceKm) : ''}
              </span>
            </button>
          </li>
        ))}
      </ol>
    </details>
  );
}
