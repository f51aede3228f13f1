import type { Approach } from '../../core/report/report';
import { distanceWords } from '../ribbon/words';

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
