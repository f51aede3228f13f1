import { Component, lazy, type ReactNode, Suspense, useState } from 'react';
import type { Approach, Report } from '../../core/report/report';
import { useDesk, useDeskStore } from '../store/context';
import type { StageLayout } from '../store/store';
import './stage-place.css';

const Stage = lazy(() => import('../stage/Stage'));
const TargetPlane = lazy(async () => ({
  default: (await import('../charts/TargetPlane')).TargetPlane,
}));
const GroundMap = lazy(async () => ({ default: (await import('../charts/GroundMap')).GroundMap }));

const LAYOUTS: { value: StageLayout; word: string }[] = [
  { value: 'both', word: 'Both scenes' },
  { value: 'sun', word: 'Sun-centred' },
  { value: 'earth', word: 'Earth-centred' },
];

type PlateName = 'target-plane' | 'ground-map';

const CHARTS: { name: PlateName; word: string; fits(approach: Approach): boolean }[] = [
  { name: 'target-plane', word: 'Target plane', fits: (approach) => approach.targetPlane !== null },
  {
    name: 'ground-map',
    word: 'Ground map',
    fits: ({ body, crossings }) =>
      body === 'Earth' && crossings.some(({ boundary }) => boundary === 'sphere-of-influence'),
  },
];

function principalOf(report: Report | null): Approach | null {
  return report === null || report.principal === null ? null : report.approaches[report.principal];
}

/** Centre: the scenes, and the further plates the case has what it needs for. */
export function StagePlace() {
  const { store } = useDesk();
  const layout = useDeskStore((state) => state.stageLayout);
  const principal = useDeskStore((state) => principalOf(state.report));
  const hasSettled = useFirstReading();
  const [enlarged, setEnlarged] = useState<PlateName | null>(null);
  const charts = principal === null ? [] : CHARTS.filter((chart) => chart.fits(principal));
  const large = charts.find((chart) => chart.name === enlarged) ?? null;
  const views = [
    ...LAYOUTS.map(({ value, word }) => ({
      word,
      chosen: large === null && layout === value,
      choose() {
        setEnlarged(null);
        store.setState({ stageLayout: value });
      },
    })),
    ...charts.map(({ name, word }) => ({
      word,
      chosen: large?.name === name,
      choose: () => setEnlarged(name),
    })),
  ];
  return (
    <section id="stage" className="stage-place" aria-labelledby="stage-title" tabIndex={-1}>
      <header className="stage-place-head">
        <h2 id="stage-title" className="only-spoken">
          Stage
        </h2>
        <fieldset className="choice">
          <legend className="only-spoken">What takes the stage</legend>
          {views.map(({ word, chosen, choose }) => (
            <label key={word}>
              <input type="radio" name="stage-view" checked={chosen} onChange={choose} />
              {word}
            </label>
          ))}
        </fieldset>
      </header>
      <div className="stage-place-scenes" hidden={large !== null}>
        <ChunkBoundary what="The scenes">
          <Suspense fallback={<Waiting />}>{hasSettled ? <Stage /> : <Waiting />}</Suspense>
        </ChunkBoundary>
      </div>
      {large !== null && (
        <div className="stage-place-large">
          <Chart name={large.name} word={large.word} />
        </div>
      )}
      {large === null && charts.length > 0 && (
        <ul className="stage-place-strip">
          {charts.map(({ name, word }) => (
            <li key={name} className={`plate-small plate-${name}`}>
              <header>
                <h3 className="caps">{word}</h3>
                <button
                  type="button"
                  className="link"
                  aria-label={`Enlarge the ${word.toLowerCase()}`}
                  onClick={() => setEnlarged(name)}
                >
                  enlarge
                </button>
              </header>
              <div className="plate-chart">
                <Chart name={name} word={word} />
              </div>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

function Waiting() {
  return <p className="stage-place-wait">The scenes are being drawn.</p>;
}

/**
 * True once the first case has been read, or there is none to wait for: the sheet is usable before
 * the 3-D chunk takes the thread to set itself up.
 */
function useFirstReading(): boolean {
  const isRead = useDeskStore(({ reading, run }) => reading !== null || run.status === 'failed');
  const [was, setWas] = useState(isRead);
  if (isRead && !was) setWas(true);
  return was;
}

function Chart({ name, word }: { name: PlateName; word: string }) {
  return (
    <ChunkBoundary what={`The ${word.toLowerCase()}`}>
      <Suspense fallback={null}>
        {name === 'target-plane' ? <TargetPlane /> : <GroundMap />}
      </Suspense>
    </ChunkBoundary>
  );
}

/** Catches a part that cannot be loaded or drawn, so that the rest of the page keeps working. */
class ChunkBoundary extends Component<
  { what: string; children: ReactNode },
  { error: Error | null }
> {
  override state: { error: Error | null } = { error: null };

  static getDerivedStateFromError(error: Error) {
    return { error };
  }

  override render() {
    const { error } = this.state;
    if (error === null) return this.props.children;
    return (
      <div className="stage-place-wait" role="alert">
        <p>
          {this.props.what} could not be drawn: {error.message}
        </p>
        <p>Everything else on the desk keeps working; load the page again to try once more.</p>
      </div>
    );
  }
}
