import { useEffect, useRef, useState } from 'react';
import type { SceneName } from '../plate/scene-source';
import { useDesk, useDeskStore } from '../store/context';
import type { NamedDistances, Station } from '../store/store';
import { usePalette } from '../theme/palette';
import { SceneEngine } from './engine';
import { Readings } from './Readings';
import { offerPictures } from './scene-picture';
import { STATIONS } from './stations';
import type { Drawing } from './surface';
import { pressKey, useGestures, ZOOM_STEP } from './use-gestures';

const NAMES: Readonly<Record<SceneName, string>> = { sun: 'Sun-centred', earth: 'Earth-centred' };

const STATION_FIELD = { sun: 'sunStation', earth: 'earthStation' } as const;

/** One scene with its words and controls. */
export function SceneView({ scene, hidden }: { scene: SceneName; hidden: boolean }) {
  const desk = useDesk();
  const palette = usePalette();
  const layout = useDeskStore((state) => state.stageLayout);
  const station = useDeskStore((state) => state[STATION_FIELD[scene]]);
  const [drawing, setDrawing] = useState<Drawing | 'starting'>('starting');
  const view = useRef<HTMLDivElement>(null);
  const plate = useRef<HTMLDivElement>(null);
  const words = useRef<HTMLDivElement>(null);
  const engine = useRef<SceneEngine | null>(null);
  const firstPalette = useRef(palette);
  const description = useDescription(scene, station);

  useEffect(() => {
    if (plate.current === null) return;
    const own = new SceneEngine(scene, desk, plate.current, firstPalette.current, setDrawing);
    engine.current = own;
    const observer = new ResizeObserver(() => measure(own, plate.current, words.current));
    observer.observe(plate.current);
    if (words.current !== null) observer.observe(words.current);
    const rewrite = () => own.rewrite();
    document.fonts.addEventListener('loadingdone', rewrite);
    return () => {
      document.fonts.removeEventListener('loadingdone', rewrite);
      observer.disconnect();
      own.dispose();
      engine.current = null;
    };
  }, [scene, desk]);

  useEffect(() => engine.current?.setPalette(palette), [palette]);
  useEffect(() => {
    if (drawing !== 'drawn' || engine.current === null) return;
    return offerPictures(scene, engine.current);
  }, [scene, drawing]);
  useGestures(view, engine);

  const alone = layout === scene;
  return (
    <section
      className={`scene scene-${scene}`}
      hidden={hidden}
      aria-label={`${NAMES[scene]} scene`}
    >
      <header className="scene-head">
        <h3 className="caps">{NAMES[scene]}</h3>
        <button
          type="button"
          className="link scene-whole"
          onClick={() => desk.store.setState({ stageLayout: alone ? 'both' : scene })}
        >
          {alone ? 'both scenes' : 'enlarge'}
          <span className="only-spoken">{alone ? '' : ` the ${NAMES[scene]} scene`}</span>
        </button>
      </header>
      <div
        ref={view}
        className="scene-view"
        role="application"
        // biome-ignore lint/a11y/noNoninteractiveTabindex: it takes the keys
        tabIndex={0}
        aria-label={description}
        onKeyDown={(event) => {
          if (event.ctrlKey || event.metaKey || event.altKey) return;
          if (pressKey(event.key, engine.current)) event.preventDefault();
        }}
      >
        <div ref={plate} className="scene-plate" />
        {(drawing === 'missing' || drawing === 'lost') && (
          <p className="scene-undrawn" role="status">
            {UNDRAWN[drawing]}
          </p>
        )}
        <div ref={words} className="scene-words">
          <Readings scene={scene} />
        </div>
      </div>
      <footer className="scene-foot">
        <Stations scene={scene} station={station} engine={engine} />
        {scene === 'earth' ? <Shown /> : null}
        <span className="scene-zoom">
          <ZoomButton word="Zoom out" sign="−" act={() => engine.current?.zoomBy(ZOOM_STEP)} />
          <ZoomButton word="Zoom in" sign="+" act={() => engine.current?.zoomBy(1 / ZOOM_STEP)} />
        </span>
      </footer>
    </section>
  );
}

const UNDRAWN: Readonly<Record<Exclude<Drawing, 'drawn'>, string>> = {
  missing:
    'This scene needs WebGL 2, which this browser does not offer. The figures, the ribbon and the findings do without it.',
  lost: 'The graphics have been taken away from this page for the moment. The scene comes back by itself; everything else keeps working.',
};

function measure(engine: SceneEngine, view: HTMLElement | null, words: HTMLElement | null): void {
  if (view === null) return;
  engine.resize(view.clientWidth, view.clientHeight);
  if (words === null) return;
  const { offsetLeft, offsetTop, offsetWidth, offsetHeight } = words;
  engine.setTaken([
    {
      left: offsetLeft,
      top: offsetTop,
      right: offsetLeft + offsetWidth,
      bottom: offsetTop + offsetHeight,
    },
  ]);
}

/** What a screen reader says of the scene: changes with the case and the station, not each frame. */
function useDescription(scene: SceneName, station: Station): string {
  const report = useDeskStore((state) => state.report);
  const from = STATIONS.find((each) => each.station === station)?.name ?? '';
  const answer = report?.findings.find((finding) => finding.kind === 'answer')?.text ?? '';
  return `${NAMES[scene]} scene, seen ${from}. ${answer} Arrow keys turn it, plus and minus zoom, 0 sets it back.`;
}

function Stations(props: {
  scene: SceneName;
  station: Station;
  engine: React.RefObject<SceneEngine | null>;
}) {
  const { store } = useDesk();
  const field = STATION_FIELD[props.scene];
  return (
    <fieldset className="scene-stations">
      <legend className="only-spoken">Seen</legend>
      {STATIONS.map(({ station, word, name }) => (
        <button
          key={station}
          type="button"
          title={`${name}; again to set the view back`}
          aria-label={name}
          aria-pressed={station === props.station}
          onClick={() => {
            store.setState({ [field]: station });
            props.engine.current?.resetHand();
          }}
        >
          {word}
        </button>
      ))}
    </fieldset>
  );
}

const DISTANCES: readonly { key: keyof NamedDistances; word: string }[] = [
  { key: 'sphereOfInfluence', word: 'Sphere of influence' },
  { key: 'moonDistance', word: 'Moon’s mean distance' },
  { key: 'geosynchronous', word: 'Geosynchronous distance' },
];

/** What the scenes show: named distances, the unperturbed path and the spread. */
function Shown() {
  const { store } = useDesk();
  const distances = useDeskStore((state) => state.namedDistances);
  const unperturbed = useDeskStore((state) => state.showUnperturbed);
  const spread = useDeskStore((state) => state.showSpread);
  return (
    <details
      className="scene-shown"
      onBlur={(event) => {
        if (!event.currentTarget.contains(event.relatedTarget)) event.currentTarget.open = false;
      }}
      onKeyDown={(event) => {
        if (event.key === 'Escape') event.currentTarget.open = false;
      }}
    >
      <summary>Shown</summary>
      <div className="scene-shown-sheet">
        {DISTANCES.map(({ key, word }) => (
          <label key={key}>
            <input
              type="checkbox"
              checked={distances[key]}
              onChange={(event) =>
                store.setState({ namedDistances: { ...distances, [key]: event.target.checked } })
              }
            />
            {word}
          </label>
        ))}
        <label>
          <input
            type="checkbox"
            checked={unperturbed}
            onChange={(event) => store.setState({ showUnperturbed: event.target.checked })}
          />
          Unperturbed path
        </label>
        <label>
          <input
            type="checkbox"
            checked={spread}
            onChange={(event) => store.setState({ showSpread: event.target.checked })}
          />
          3 σ tube and ellipsoid
        </label>
      </div>
    </details>
  );
}

function ZoomButton({ word, sign, act }: { word: string; sign: string; act(): void }) {
  return (
    <button type="button" aria-label={word} title={word} onClick={act}>
      {sign}
    </button>
  );
}
