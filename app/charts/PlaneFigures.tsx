import type { Approach } from '../../core/report/report';
import { grouped, withUnit } from '../desk/figures';
import type { PlaneAxes } from './plane-axes';
import { ellipseRows } from './plane-words';

/** The figures of the target plane, from the report. */
export function PlaneFigures({ approach, axes }: { approach: Approach; axes: PlaneAxes }) {
  const { targetPlane: plane, hyperbola, osculatingAt } = approach;
  if (plane === null || hyperbola === null) return null;
  const rows: [string, number][] = [
    ['B·T', plane.bDotTKm],
    ['B·R', plane.bDotRKm],
    ['ξ', plane.xiKm],
    ['ζ', plane.zetaKm],
    ['|B|, impact parameter', hyperbola.impactParameterKm],
    ['capture radius', plane.impactRadiusKm],
  ];
  return (
    <>
      <dl className="plane-figures">
        {rows.map(([label, km]) => (
          <div key={label}>
            <dt>{label}</dt>
            <dd className="figures">{withUnit(grouped(km, Math.abs(km) < 1e5 ? 1 : 0), 'km')}</dd>
          </div>
        ))}
        <div>
          <dt>excess speed</dt>
          <dd className="figures">{withUnit(grouped(hyperbola.excessSpeedKmS, 3), 'km/s')}</dd>
        </div>
        {ellipseRows(approach, axes).map(([label, figure]) => (
          <div key={label}>
            <dt>{label}</dt>
            <dd className="figures">{figure}</dd>
          </div>
        ))}
      </dl>
      <p className="plane-note">
        Seen along the incoming motion. T lies in the ecliptic, R points to its south; ζ runs
        against the motion of {approach.body === 'Earth' ? 'the Earth' : approach.body}, ξ across
        it. Osculating at {OSCULATING_WORDS[osculatingAt]}.
      </p>
    </>
  );
}

const OSCULATING_WORDS: Record<Approach['osculatingAt'], string> = {
  'closest-approach': 'closest approach',
  'entry-sphere': 'the entry sphere',
  surface: 'the surface',
};
