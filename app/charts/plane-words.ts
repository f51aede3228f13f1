import type { Approach } from '../../core/report/report';
import { grouped, withUnit } from '../desk/figures';
import { distanceWords } from '../ribbon/words';
import type { PlaneAxes } from './plane-axes';

const THE: Partial<Record<Approach['body'], string>> = { Earth: 'the Earth', Moon: 'the Moon' };

/** The target plane in words, for those who do not see it. */
export function planeWords(approach: Approach): string {
  const { targetPlane, hyperbola, body } = approach;
  if (targetPlane === null || hyperbola === null) return boundWords(approach);
  const inside = hyperbola.impactParameterKm < targetPlane.impactRadiusKm;
  return `The incoming line of motion pierces the target plane ${distanceWords(hyperbola.impactParameterKm)} from the centre of ${THE[body] ?? body}, at B·T ${distanceWords(targetPlane.bDotTKm)} and B·R ${distanceWords(targetPlane.bDotRKm)}. What aims within ${distanceWords(targetPlane.impactRadiusKm)} meets ${THE[body] ?? body}: this line runs ${inside ? 'inside' : 'outside'} that disc.`;
}

/** Why there is no target plane. */
export function boundWords({ body }: Approach): string {
  return `There is no target plane: at its closest the object is bound to ${THE[body] ?? body} and comes in on no hyperbola.`;
}

/** The 1 σ ellipse in figures, on the axes shown; nothing without a covariance. */
export function ellipseRows(approach: Approach, axes: PlaneAxes): [string, string][] {
  const ellipse = approach.uncertainty?.ellipse ?? null;
  if (ellipse === null) return [];
  const { semiMajorKm, semiMinorKm, angleTrDeg, angleXiZetaDeg } = ellipse;
  const km = (value: number) => withUnit(grouped(value, value < 100 ? 2 : 0), 'km');
  const [from, angle] =
    axes === 'tr' ? ['T towards R', angleTrDeg] : ['ξ towards ζ', angleXiZetaDeg];
  return [
    ['1 σ half axes', `${km(semiMajorKm)} × ${km(semiMinorKm)}`],
    [`major axis, ${from}`, withUnit(grouped(angle, 1), '°')],
  ];
}
