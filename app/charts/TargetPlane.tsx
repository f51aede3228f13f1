import { useId, useRef, useState } from 'react';
import type { Approach } from '../../core/report/report';
import { reportOfTrajectory } from '../ribbon/shown-report';
import { useSize } from '../ribbon/use-size';
import { useDeskStore } from '../store/context';
import { PlaneFigures } from './PlaneFigures';
import { PlaneSheet } from './PlaneSheet';
import { fittingHalfKm, limitedHalfKm, type PlaneAxes } from './plane-geometry';
import { boundWords } from './plane-words';
import './target-plane.css';

const AXES: { value: PlaneAxes; word: string }[] = [
  { value: 'tr', word: 'T, R' },
  { value: 'xi-zeta', word: 'ξ, ζ' },
];

const ZOOM_STEP = 1.5;

/** Where the principal approach aims, against the body and its capture disc. */
export function TargetPlane() {
  const report = useDeskStore(reportOfTrajectory);
  const principal =
    report === null || report.principal === null ? null : report.approaches[report.principal];
  if (principal === null) return null;
  if (principal.targetPlane === null) return <p className="plane-none">{boundWords(principal)}</p>;
  return <Plane key={principal.tdbSeconds} approach={principal} />;
}

function Plane({ approach }: { approach: Approach }) {
  const name = useId();
  const sheet = useRef<HTMLDivElement>(null);
  const size = useSize(sheet);
  const [axes, setAxes] = useState<PlaneAxes>('tr');
  const [halfKm, setHalfKm] = useState(() => fittingHalfKm(approach));
  const zoom = (factor: number) => setHalfKm((half) => limitedHalfKm(approach, half * factor));
  return (
    <div className="plane">
      <div className="plane-body">
        <div ref={sheet} className="plane-sheet">
          <PlaneSheet approach={approach} axes={axes} halfKm={halfKm} size={size} zoom={zoom} />
        </div>
        <div className="plane-side">
          <div className="plane-controls">
            <fieldset className="choice">
              <legend className="only-spoken">Axes of the target plane</legend>
              {AXES.map(({ value, word }) => (
                <label key={value}>
                  <input
                    type="radio"
                    name={name}
                    checked={axes === value}
                    onChange={() => setAxes(value)}
                  />
                  {word}
                </label>
              ))}
            </fieldset>
            <div className="plane-zoom">
              <button
                type="button"
                className="button"
                aria-label="Show more of the plane"
                onClick={() => zoom(ZOOM_STEP)}
              >
                −
              </button>
              <button
                type="button"
                className="button"
                aria-label="Show less of the plane, larger"
                onClick={() => zoom(1 / ZOOM_STEP)}
              >
                +
              </button>
              <button
                type="button"
                className="button"
                onClick={() => setHalfKm(fittingHalfKm(approach))}
              >
                Fit
              </button>
            </div>
          </div>
          <PlaneFigures approach={approach} />
        </div>
      </div>
    </div>
  );
}
