import { useSyncExternalStore } from 'react';
import type { Approach } from '../../core/report/report';
import { grouped } from '../desk/figures';
import { useDesk } from '../store/context';
import type { CloneCloud } from '../worker/clone-cloud';
import { CLONE_POINT } from '../worker/core-values';

/** What the marks mean, in one line; only those that are drawn. */
export function PlaneKey({ approach, cloud }: { approach: Approach; cloud: CloneCloud }) {
  const { store } = useDesk();
  const hasClones = useSyncExternalStore(store.subscribe, () => cloud.points('plain').length > 0);
  const hasRare = useSyncExternalStore(store.subscribe, () => cloud.points('rare').length > 0);
  // Said once they rest: a figure that runs is read elsewhere.
  const drawn = useSyncExternalStore(store.subscribe, () =>
    store.getState().estimate.status === 'running'
      ? null
      : cloud.points('plain').length / CLONE_POINT.size,
  );
  const clones = drawn === null ? 'clone' : `clone, ${grouped(drawn)} drawn`;
  const ellipse = approach.uncertainty?.ellipse ?? null;
  if (ellipse === null && !hasClones && !hasRare) return null;
  return (
    <p className="plane-key">
      {ellipse !== null && <Entry word="1, 2, 3 σ" mark="ellipse" />}
      {approach.lineOfVariations !== undefined && <Entry word="line of variations" mark="line" />}
      {hasClones && <Entry word={clones} mark="clone" />}
      {hasClones && <Entry word="that hits" mark="impact" />}
      {hasRare && <Entry word="rare-event clone" mark="rare" />}
      {hasRare && <Entry word="that hits" mark="rare-impact" />}
    </p>
  );
}

type Mark = 'ellipse' | 'line' | 'clone' | 'impact' | 'rare' | 'rare-impact';

function Entry({ word, mark }: { word: string; mark: Mark }) {
  return (
    <span>
      <svg width="18" height="12" viewBox="-9 -6 18 12" aria-hidden="true">
        {MARKS[mark]}
      </svg>
      {word}
    </span>
  );
}

const MARKS: Record<Mark, React.ReactNode> = {
  ellipse: <ellipse className="plane-ellipse" rx="8" ry="4" />,
  line: <path className="plane-line" d="M-8 3Q0 -3 8 -2M0 -4v7" />,
  clone: <circle className="plane-key-clone" r="1.6" />,
  impact: <path className="plane-key-impact" d="M-3 -3l6 6M-3 3l6 -6" />,
  rare: <circle className="plane-key-rare" r="2.2" />,
  'rare-impact': <path className="plane-key-rare" d="M-3.5 0h7M0 -3.5v7" />,
};
