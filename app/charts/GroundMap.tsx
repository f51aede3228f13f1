import { geoCircle, geoDistance, geoGraticule, geoPath } from 'd3-geo';
import { useDeferredValue, useEffect, useId, useMemo, useRef, useState } from 'react';
import type { ReportCorridor } from '../../core/report/corridor';
import type { Approach } from '../../core/report/report';
import { reportOfTrajectory } from '../ribbon/shown-report';
import { useSize } from '../ribbon/use-size';
import { distanceWords, momentWords } from '../ribbon/words';
import { useDesk, useDeskStore } from '../store/context';
import type { Trajectory } from '../worker/trajectory';
import { groundTrack, type LonLat, pointsBeneath } from './ground-track';
import { LAND } from './land';
import { CorridorKey, Drawn, MapCorridor } from './MapCorridor';
import { MapMarks, MapTicks, markBoxes } from './MapMarks';
import { corridorShapes } from './map-corridor';
import {
  closeProjection,
  graticuleStep,
  isOnSheet,
  mapMarks,
  mapProjection,
  middleLongitude,
  placeWords,
  WIDEST_CLOSE_DEG,
} from './map-geometry';
import { mapWords } from './map-words';
import './ground-map.css';

/** Height of the line of words under the map, px. */
const LINE_PX = 22;
/** Of the key of the corridor over that line: in two rows, in three where it is narrow. */
const KEY_PX = 40;
const NARROW_KEY_PX = 58;
const NARROW_PX = 640;
/** Narrower or lower only the marks are named, and every tick but hours is left out. */
const THUMBNAIL_WIDTH_PX = 380;
const THUMBNAIL_HEIGHT_PX = 220;

/** The shade is drawn anew when the Sun has moved so far: a pixel or two of a large map. */
const SHADE_STEP_RAD = 0.012;

const graticule = (stepDeg: number) => geoGraticule().step([stepDeg, stepDeg])();
const WORLD_STEP_DEG = 30;
const nightOf = ([longitude, latitude]: LonLat) =>
  geoCircle()
    .center([longitude + 180, -latitude])
    .radius(90)();

/** The path of the point beneath the object, with day and night at the clock. */
export function GroundMap() {
  // The map is heavy to draw: the rest of the page does not wait for it.
  const report = useDeferredValue(useDeskStore(reportOfTrajectory));
  const trajectory = useDeferredValue(useDeskStore((state) => state.trajectory));
  const principal =
    report === null || report.principal === null ? null : report.approaches[report.principal];
  if (principal === null) return null;
  if (principal.body !== 'Earth') {
    return (
      <p className="map-none">
        There is no ground track: the principal approach is to the {principal.body}.
      </p>
    );
  }
  return (
    <Track
      key={principal.tdbSeconds}
      approach={principal}
      trajectory={trajectory}
      corridor={report?.corridor ?? null}
    />
  );
}

function Track(props: {
  approach: Approach;
  trajectory: Trajectory;
  corridor: ReportCorridor | null;
}) {
  const { approach, trajectory, corridor } = props;
  const [wantsWorld, setWantsWorld] = useState(false);
  const shapes = useMemo(() => (corridor === null ? null : corridorShapes(corridor)), [corridor]);
  const close = shapes !== null && shapes.radiusDeg <= WIDEST_CLOSE_DEG ? shapes : null;
  const isClose = close !== null && !wantsWorld;
  const box = useRef<HTMLDivElement>(null);
  const { widthPx, heightPx } = useSize(box);
  const isThumbnail = widthPx < THUMBNAIL_WIDTH_PX || heightPx < THUMBNAIL_HEIGHT_PX;
  const keyPx = widthPx < NARROW_PX ? NARROW_KEY_PX : KEY_PX;
  const footPx = corridor === null || isThumbnail ? LINE_PX : LINE_PX + keyPx;
  const track = useMemo(() => groundTrack(approach, trajectory), [approach, trajectory]);
  const map = useMemo(() => {
    if (track === null || widthPx < 60 || heightPx < 60) return null;
    const closest = pointsBeneath(trajectory, track.zeroTdbSeconds)?.object ?? track.points[0];
    const height = heightPx - footPx;
    const projection = isClose
      ? closeProjection(widthPx, height, close.centre, close.radiusDeg)
      : mapProjection(widthPx, height, shapes?.centre[0] ?? middleLongitude(approach, closest));
    const all = mapMarks(approach, track, closest).filter(
      ({ kind }) => kind !== 'closest' || shapes === null,
    );
    return {
      projection,
      path: geoPath(projection),
      marks: isClose ? all.filter(({ at }) => isOnSheet(projection, at, widthPx, height)) : all,
    };
  }, [approach, trajectory, track, widthPx, heightPx, footPx, shapes, close, isClose]);
  return (
    <div ref={box} className="map">
      {map !== null && track !== null && (
        <>
          {/* Four sheets, one over the other: what moves does not make the coasts be drawn again. */}
          <div
            className="map-sheets"
            role="img"
            aria-label={`Ground map. ${mapWords(approach, map.marks, corridor)}`}
            style={{ width: widthPx, height: heightPx - footPx }}
          >
            <svg className="map-svg" aria-hidden="true">
              <Drawn
                className="map-graticule"
                path={map.path}
                shape={graticule(isClose ? graticuleStep(close.radiusDeg) : WORLD_STEP_DEG)}
              />
              <Drawn className="map-land" path={map.path} shape={LAND} />
            </svg>
            <Night map={map} trajectory={trajectory} />
            <svg className="map-svg" aria-hidden="true">
              {isClose ? (
                <path className="map-frame" d={`M1 1H${widthPx - 1}V${heightPx - footPx - 1}H1Z`} />
              ) : (
                <path className="map-frame" d={map.path({ type: 'Sphere' }) ?? ''} />
              )}
              <path
                className={shapes === null ? 'map-track' : 'map-track map-track-aside'}
                d={map.path({ type: 'LineString', coordinates: track.points }) ?? ''}
              />
              {!isThumbnail && shapes === null && <MapTicks map={map} track={track} />}
              {shapes !== null && (
                <MapCorridor
                  map={map}
                  shapes={shapes}
                  taken={markBoxes(map, widthPx)}
                  withWords={!isThumbnail}
                  widthPx={widthPx}
                  heightPx={heightPx - footPx}
                />
              )}
              <MapMarks map={map} withWords={!isThumbnail} widthPx={widthPx} />
            </svg>
            <Now map={map} trajectory={trajectory} />
          </div>
          {corridor !== null && !isThumbnail && <CorridorKey corridor={corridor} />}
          {close !== null && !isThumbnail && (
            <ViewChoice wantsWorld={wantsWorld} choose={setWantsWorld} />
          )}
          <Beneath trajectory={trajectory} isThumbnail={isThumbnail} />
        </>
      )}
    </div>
  );
}

/** The whole Earth, or the corridor alone. */
function ViewChoice(props: { wantsWorld: boolean; choose: (wantsWorld: boolean) => void }) {
  const { wantsWorld, choose } = props;
  const name = useId();
  const option = (value: boolean, word: string) => (
    <label>
      <input
        type="radio"
        name={name}
        checked={wantsWorld === value}
        onChange={() => choose(value)}
      />
      {word}
    </label>
  );
  return (
    <fieldset className="choice map-view">
      <legend className="only-spoken">What the map shows</legend>
      {option(true, 'world')}
      {option(false, 'corridor')}
    </fieldset>
  );
}

type Map = { projection: ReturnType<typeof mapProjection>; path: ReturnType<typeof geoPath> };

/** The half of the Earth in darkness at the clock, and the point beneath the Sun. */
function Night({ map, trajectory }: { map: Map; trajectory: Trajectory }) {
  const { clock } = useDesk();
  const hatching = useId();
  const night = useRef<SVGPathElement>(null);
  const sun = useRef<SVGGElement>(null);
  useEffect(() => {
    let drawn: LonLat | null = null;
    const draw = () => {
      const points = pointsBeneath(trajectory, clock.tdbSeconds);
      if (points === null) return;
      // The shade is heavy to draw: only when it would be seen to have moved.
      if (drawn !== null && geoDistance(drawn, points.sun) < SHADE_STEP_RAD) return;
      drawn = points.sun;
      night.current?.setAttribute('d', map.path(nightOf(points.sun)) ?? '');
      const [x, y] = map.projection(points.sun) ?? [0, 0];
      sun.current?.setAttribute('transform', `translate(${x} ${y})`);
    };
    draw();
    return clock.subscribe(draw);
  }, [map, trajectory, clock]);
  return (
    <svg className="map-svg" aria-hidden="true">
      <pattern id={hatching} width={5} height={5} patternUnits="userSpaceOnUse">
        <path className="map-hatch" d="M-1 1l2 -2M0 5l5 -5M4 6l2 -2" />
      </pattern>
      <path ref={night} className="map-night" fill={`url(#${hatching})`} />
      <g ref={sun} className="map-sun">
        <circle r={5} />
        <circle r={1.2} />
      </g>
    </svg>
  );
}

/** The point beneath the object at the clock. */
function Now({ map, trajectory }: { map: Map; trajectory: Trajectory }) {
  const { clock } = useDesk();
  const mark = useRef<SVGGElement>(null);
  useEffect(() => {
    const draw = () => {
      const points = pointsBeneath(trajectory, clock.tdbSeconds);
      if (points === null) return;
      const [x, y] = map.projection(points.object) ?? [0, 0];
      mark.current?.setAttribute('transform', `translate(${x} ${y})`);
    };
    draw();
    return clock.subscribe(draw);
  }, [map, trajectory, clock]);
  return (
    <svg className="map-svg" aria-hidden="true">
      <g ref={mark} className="map-now">
        <circle r={7} />
        <circle className="map-now-dot" r={3} />
      </g>
    </svg>
  );
}

/** Where the object stands overhead at the clock, in words and figures. */
function Beneath({ trajectory, isThumbnail }: { trajectory: Trajectory; isThumbnail: boolean }) {
  const { clock } = useDesk();
  const words = useRef<HTMLSpanElement>(null);
  useEffect(() => {
    const write = () => {
      const points = pointsBeneath(trajectory, clock.tdbSeconds);
      if (points === null || words.current === null) return;
      const place = `${placeWords(points.object)}, ${distanceWords(points.altitudeKm)} up`;
      words.current.textContent = isThumbnail
        ? place
        : `${place}, ${momentWords(points.tdbSeconds)} UTC`;
    };
    write();
    return clock.subscribe(write);
  }, [trajectory, clock, isThumbnail]);
  return (
    <p className="map-beneath">
      {isThumbnail ? 'Over' : 'Overhead at'} <span ref={words} className="figures" />
    </p>
  );
}
