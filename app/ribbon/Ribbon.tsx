import { useRef, useState } from 'react';
import type { Pace } from './pace';
import { RibbonSlider } from './RibbonSlider';
import { TransportBar } from './TransportBar';
import { usePlay } from './use-play';
import { useRibbonGeometry } from './use-ribbon-geometry';
import { useSize } from './use-size';
import './ribbon.css';

/** Bottom: the curve of geocentric distance against time is the scrubber of the desk's clock. */
export function Ribbon() {
  const sheet = useRef<HTMLDivElement>(null);
  const { widthPx } = useSize(sheet);
  const [pace, setPace] = useState<Pace>('normal');
  const geometry = useRibbonGeometry(widthPx);
  usePlay(geometry?.time ?? null, pace);
  return (
    <div ref={sheet} className="ribbon">
      {geometry === null ? (
        <p className="ribbon-empty">
          The curve of distance against time stands here as soon as a case is being computed.
        </p>
      ) : (
        <>
          <TransportBar geometry={geometry} pace={pace} setPace={setPace} />
          <RibbonSlider geometry={geometry} widthPx={widthPx} />
        </>
      )}
    </div>
  );
}
