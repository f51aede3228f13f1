import { type KeyboardEvent, type PointerEvent, useEffect, useMemo, useRef } from 'react';
import type { Approach } from '../../core/report/report';
import type { CloneCloud } from '../worker/clone-cloud';
import { PlaneClone } from './PlaneClone';
import { PlaneClones } from './PlaneClones';
import { PlaneSheet } from './PlaneSheet';
import { type Place, type PlaneAxes, turnBetween, turned } from './plane-axes';
import { type PlaneGeometry, planeGeometry, unprojected } from './plane-geometry';
import { viewAfterKey } from './plane-keys';
import { clonesByDistance, nearestClone, type PickedClone } from './plane-pick';
import { fittingView, type PlaneView, panned, zoomed } from './plane-view';

/** Room for the tick words at the left and at the foot, px. */
const MARGIN_LEFT = 70;
const MARGIN_FOOT = 22;
/** Below this height the sheet is a thumbnail: always the whole, no ticks, fewer words. */
const THUMBNAIL_PX = 200;
const WHEEL_ZOOM = 1 / 500;
/** How far from the pointer a clone is picked up, px. */
const PICK_PX = 9;

/** The target plane under the hand: clones, the drawing over them, and the clone pointed at. */
export function PlaneSurface(props: {
  approach: Approach;
  cloud: CloneCloud;
  axes: PlaneAxes;
  view: PlaneView;
  size: { widthPx: number; heightPx: number };
  picked: PickedClone | null;
  setView(change: (view: PlaneView) => PlaneView): void;
  /** `byKey`: the clone is to be told to those who do not see it. */
  pick(picked: PickedClone | null, byKey: boolean): void;
}) {
  const { approach, cloud, axes, size, picked, setView, pick } = props;
  const isThumbnail = size.heightPx < THUMBNAIL_PX;
  const view = useMemo(
    () => (isThumbnail ? fittingView(approach) : props.view),
    [isThumbnail, approach, props.view],
  );
  const leftPx = isThumbnail ? 0 : MARGIN_LEFT;
  const widthPx = size.widthPx - leftPx - 1;
  const heightPx = size.heightPx - (isThumbnail ? 0 : MARGIN_FOOT) - 1;
  const hasRoom = size.widthPx > 60 && size.heightPx > 60;
  const geometry = useMemo(
    () => (hasRoom ? planeGeometry(approach, axes, view, widthPx, heightPx) : null),
    [hasRoom, approach, axes, view, widthPx, heightPx],
  );
  if (geometry === null) return null;
  const shown = { approach, axes, geometry, leftPx, widthPx, heightPx };
  const drawing = (
    <>
      <PlaneClones
        cloud={cloud}
        project={geometry.project}
        leftPx={leftPx}
        widthPx={widthPx}
        heightPx={heightPx}
      />
      <PlaneSheet {...shown} isThumbnail={isThumbnail} />
    </>
  );
  if (isThumbnail) return drawing;
  return (
    <Hand {...shown} cloud={cloud} picked={picked} setView={setView} pick={pick}>
      {drawing}
      {picked !== null && <PlaneClone {...shown} cloud={cloud} picked={picked} />}
    </Hand>
  );
}

/** Pointer, wheel and keys over the sheet. */
function Hand(props: {
  approach: Approach;
  cloud: CloneCloud;
  axes: PlaneAxes;
  geometry: PlaneGeometry;
  leftPx: number;
  picked: PickedClone | null;
  setView(change: (view: PlaneView) => PlaneView): void;
  pick(picked: PickedClone | null, byKey: boolean): void;
  children: React.ReactNode;
}) {
  const { approach, cloud, axes, geometry, leftPx, picked, setView, pick } = props;
  const surface = useRef<HTMLDivElement>(null);
  const dragged = useRef<{ x: number; y: number } | null>(null);
  const order = useRef<{ cloud: CloneCloud; version: number; clones: PickedClone[] } | null>(null);
  const latest = useRef({ approach, geometry, setView });
  useEffect(() => {
    latest.current = { approach, geometry, setView };
  }, [approach, geometry, setView]);

  useEffect(() => {
    const element = surface.current;
    if (element === null) return;
    const wheel = (event: WheelEvent) => {
      event.preventDefault();
      const { approach, geometry, setView } = latest.current;
      const box = element.getBoundingClientRect();
      const about = unprojected(
        geometry.project,
        event.clientX - box.left - leftPx,
        event.clientY - box.top,
      );
      const lines = event.deltaMode === WheelEvent.DOM_DELTA_LINE ? 16 : 1;
      const factor = Math.exp(event.deltaY * lines * WHEEL_ZOOM);
      setView((view) => zoomed(approach, view, factor, about));
    };
    element.addEventListener('wheel', wheel, { passive: false });
    return () => element.removeEventListener('wheel', wheel);
  }, [leftPx]);

  const turn = turnBetween(approach, axes);
  const toTr = (place: Place) => turned(place, -turn);

  /** The clone a step farther from the body's centre, or nearer to it; first the nearest. */
  function step(by: 1 | -1): void {
    if (order.current?.cloud !== cloud || order.current.version !== cloud.version) {
      order.current = { cloud, version: cloud.version, clones: clonesByDistance(cloud) };
    }
    const { clones } = order.current;
    if (clones.length === 0) return;
    const at = clones.findIndex((one) => one.drawn === picked?.drawn && one.at === picked.at);
    pick(clones[Math.min(Math.max(at + by, 0), clones.length - 1)], true);
  }

  function press(event: KeyboardEvent): void {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const key = event.key.length === 1 ? event.key.toLowerCase() : event.key;
    if (key === 'n' || key === 'p') {
      step(key === 'n' ? 1 : -1);
    } else if (key === 'Escape' && picked !== null) {
      pick(null, true);
    } else if (viewAfterKey(approach, fittingView(approach), key, toTr) !== null) {
      setView((view) => viewAfterKey(approach, view, key, toTr) ?? view);
    } else return;
    event.preventDefault();
    event.stopPropagation();
  }

  function move(event: PointerEvent): void {
    const from = dragged.current;
    if (from !== null) {
      dragged.current = { x: event.clientX, y: event.clientY };
      const by = toTr({ across: from.x - event.clientX, down: from.y - event.clientY });
      const { pxPerKm } = geometry;
      setView((view) =>
        panned(approach, view, { across: by.across / pxPerKm, down: by.down / pxPerKm }),
      );
      return;
    }
    const box = event.currentTarget.getBoundingClientRect();
    const [x, y] = [event.clientX - box.left - leftPx, event.clientY - box.top];
    const nearest = nearestClone(cloud, geometry.project, x, y, PICK_PX);
    if (nearest?.drawn !== picked?.drawn || nearest?.at !== picked?.at) pick(nearest, false);
  }

  return (
    <div
      ref={surface}
      className="plane-surface"
      role="application"
      aria-label="Target plane: arrows move, plus and minus zoom, 0 fits, D shows the disc, 3 the 3 σ ellipse, N and P step through the clones"
      // biome-ignore lint/a11y/noNoninteractiveTabindex: it takes the keys
      tabIndex={0}
      onKeyDown={press}
      onPointerDown={(event) => {
        if (event.button !== 0) return;
        event.currentTarget.setPointerCapture(event.pointerId);
        dragged.current = { x: event.clientX, y: event.clientY };
      }}
      onPointerMove={move}
      onPointerUp={() => {
        dragged.current = null;
      }}
      onPointerCancel={() => {
        dragged.current = null;
      }}
      onPointerLeave={() => {
        if (dragged.current === null) pick(null, false);
      }}
      onDoubleClick={() => setView(() => fittingView(approach))}
    >
      {props.children}
    </div>
  );
}
