import { useEffect, useId, useRef, useState } from 'react';
import type { Approach } from '../../core/report/report';
import { reportOfTrajectory } from '../ribbon/shown-report';
import { useSize } from '../ribbon/use-size';
import { distanceWords } from '../ribbon/words';
import { useDeskStore } from '../store/context';
import type { CloneCloud } from '../worker/clone-cloud';
import { PlaneFigures } from './PlaneFigures';
import { PlaneKey } from './PlaneKey';
import { PlaneSurface } from './PlaneSurface';
import { type PlaneAxes, turnBetween } from './plane-axes';
import { ZOOM_STEP } from './plane-keys';
import { cloneFigures, type PickedClone } from './plane-pick';
import { discView, fittingView, type PlaneView, threeSigmaView, zoomed } from './plane-view';
import { boundWords } from './plane-words';
import './target-plane.css';

const AXES: { value: PlaneAxes; word: string }[] = [
  { value: 'tr', word: 'T, R' },
  { value: 'xi-zeta', word: 'ξ, ζ' },
];

/** After the last change of the scale it is said, ms: a wheel turns through many. */
const SAY_AFTER_MS = 350;

/** Where the principal approach aims, against the body and its capture disc. */
export function TargetPlane() {
  const report = useDeskStore(reportOfTrajectory);
  const cloud = useDeskStore((state) => state.clones);
  const principal =
    report === null || report.principal === null ? null : report.approaches[report.principal];
  if (principal === null) return null;
  if (principal.targetPlane === null) return <p className="plane-none">{boundWords(principal)}</p>;
  return <Plane key={principal.tdbSeconds} approach={principal} cloud={cloud} />;
}

function Plane({ approach, cloud }: { approach: Approach; cloud: CloneCloud }) {
  const name = useId();
  const sheet = useRef<HTMLDivElement>(null);
  const size = useSize(sheet);
  const [axes, setAxes] = useState<PlaneAxes>('tr');
  const [view, setView] = useState(() => fittingView(approach));
  const [pick, setPick] = useState<{ of: CloneCloud; clone: PickedClone; byKey: boolean } | null>(
    null,
  );
  const picked = pick?.of === cloud ? pick.clone : null;
  const scaleWords = `${distanceWords(view.halfKm)} from the middle to the nearer edge`;
  const said =
    pick?.byKey === true && picked !== null
      ? cloneWords(approach, cloud, picked, axes)
      : scaleWords;
  const threeSigma = threeSigmaView(approach);
  const zoom = (factor: number) =>
    setView((before) => zoomed(approach, before, factor, before.centre));
  return (
    <div className="plane">
      <div className="plane-body">
        <div ref={sheet} className="plane-sheet">
          <PlaneSurface
            approach={approach}
            cloud={cloud}
            axes={axes}
            view={view}
            size={size}
            picked={picked}
            setView={setView}
            pick={(clone, byKey) => setPick(clone === null ? null : { of: cloud, clone, byKey })}
          />
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
            </div>
            <div className="plane-zoom">
              <Preset word="Disc" view={discView(approach)} setView={setView} />
              {threeSigma !== null && <Preset word="3 σ" view={threeSigma} setView={setView} />}
              <Preset word="Fit" view={fittingView(approach)} setView={setView} />
            </div>
          </div>
          <PlaneFigures approach={approach} axes={axes} />
        </div>
      </div>
      <PlaneKey approach={approach} cloud={cloud} />
      <Said words={said} />
    </div>
  );
}

function Preset(props: { word: string; view: PlaneView; setView(view: PlaneView): void }) {
  return (
    <button type="button" className="button" onClick={() => props.setView(props.view)}>
      {props.word}
    </button>
  );
}

function cloneWords(
  approach: Approach,
  cloud: CloneCloud,
  picked: PickedClone,
  axes: PlaneAxes,
): string {
  const { title, outcome, rows } = cloneFigures(cloud, picked, axes, turnBetween(approach, axes));
  return `${title} ${outcome}: ${rows.map((row) => row.join(' ')).join(', ')}`;
}

/** Says to a screen reader what has changed, once it rests; the first state is not said. */
function Said({ words }: { words: string }) {
  const line = useRef<HTMLParagraphElement>(null);
  const before = useRef(words);
  useEffect(() => {
    if (before.current === words) return;
    before.current = words;
    const timer = setTimeout(() => {
      if (line.current !== null) line.current.textContent = words;
    }, SAY_AFTER_MS);
    return () => clearTimeout(timer);
  }, [words]);
  return <p ref={line} className="only-spoken" role="status" />;
}
