import { useEffect, useRef } from 'react';
import { useDesk } from '../store/context';
import { clockReading } from './clock-reading';
import type { RibbonGeometry } from './geometry';
import { type Pace, paceWords } from './pace';

/** The moment, the distance and its rate at the clock; written without React, every frame. */
export function ReadOut({ geometry }: { geometry: RibbonGeometry }) {
  const { store, clock } = useDesk();
  const moment = useRef<HTMLSpanElement>(null);
  const distance = useRef<HTMLSpanElement>(null);
  const rate = useRef<HTMLSpanElement>(null);
  const { anchor } = geometry;
  useEffect(() => {
    const write = () => {
      const reading = clockReading(store.getState().trajectory, anchor, clock.tdbSeconds);
      if (reading === null) return;
      if (moment.current !== null) moment.current.textContent = reading.moment;
      if (distance.current !== null) distance.current.textContent = reading.distance;
      if (rate.current !== null) rate.current.textContent = reading.rate;
    };
    write();
    return clock.subscribe(write);
  }, [store, clock, anchor]);
  return (
    <p className="ribbon-read-out">
      <span>
        <span ref={moment} className="figures ribbon-moment" /> <span className="caps">UTC</span>
      </span>
      <span ref={distance} className="figures ribbon-distance" title="from Earth’s centre" />
      <span ref={rate} className="figures ribbon-rate" title="rate of change of the distance" />
    </p>
  );
}

/** How much time a second of play covers at the clock's place. */
export function PaceReadOut({ geometry, pace }: { geometry: RibbonGeometry; pace: Pace }) {
  const { clock } = useDesk();
  const words = useRef<HTMLSpanElement>(null);
  const { time } = geometry;
  useEffect(() => {
    const write = () => {
      const unit = Math.min(1, Math.max(0, time.unitAt(clock.tdbSeconds)));
      if (words.current !== null) {
        words.current.textContent = paceWords(time.secondsPerUnit(unit), pace);
      }
    };
    write();
    return clock.subscribe(write);
  }, [clock, time, pace]);
  return <span ref={words} className="figures ribbon-pace" />;
}
