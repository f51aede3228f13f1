import type { Approach } from '../../core/report/report';
import type { CloneCloud } from '../worker/clone-cloud';
import { CLONE_POINT } from '../worker/core-values';
import { type PlaneAxes, turnBetween } from './plane-axes';
import type { PlaneGeometry } from './plane-geometry';
import { cloneFigures, type PickedClone } from './plane-pick';

/** Room the words need, px. */
const BOX_WIDTH = 200;
const BOX_HEIGHT = 150;

/** A clone's figures beside it. */
export function PlaneClone(props: {
  approach: Approach;
  cloud: CloneCloud;
  axes: PlaneAxes;
  geometry: PlaneGeometry;
  picked: PickedClone;
  leftPx: number;
  widthPx: number;
  heightPx: number;
}) {
  const { approach, cloud, axes, geometry, picked, leftPx, widthPx, heightPx } = props;
  const { x0, xT, xR, y0, yT, yR } = geometry.project;
  const points = cloud.points(picked.drawn);
  const t = points[picked.at + CLONE_POINT.bDotTKm];
  const r = points[picked.at + CLONE_POINT.bDotRKm];
  const x = x0 + xT * t + xR * r;
  const y = y0 + yT * t + yR * r;
  const { title, outcome, rows } = cloneFigures(cloud, picked, axes, turnBetween(approach, axes));
  const isShown = x >= 0 && x <= widthPx && y >= 0 && y <= heightPx;
  const wanted = x + 14 + BOX_WIDTH < widthPx ? x + 14 : x - 14 - BOX_WIDTH;
  const within = (value: number, most: number) => Math.min(Math.max(value, 4), Math.max(4, most));
  return (
    <>
      {isShown && (
        <span className="plane-clone-mark" style={{ left: leftPx + x - 7, top: y - 7 }} />
      )}
      <div
        className="plane-clone"
        style={{
          left: leftPx + within(wanted, widthPx - BOX_WIDTH - 4),
          top: within(y + 10, heightPx - BOX_HEIGHT - 4),
          width: BOX_WIDTH,
        }}
        aria-hidden="true"
      >
        <p className="plane-clone-name">
          {title}, <em>{outcome}</em>
        </p>
        <dl>
          {rows.map(([label, figure]) => (
            <div key={label} className="plane-clone-row">
              <dt>{label}</dt>
              <dd className="figures">{figure}</dd>
            </div>
          ))}
        </dl>
      </div>
    </>
  );
}
