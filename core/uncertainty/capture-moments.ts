/** A Gaussian in its own principal axes, cut to a disc about the origin: where in the disc it sits. */

export interface CaptureMoments {
  /** Share of the Gaussian inside the disc; a figure to plan with, within some percent. */
  probability: number;
  /** Least distance of the disc from the Gaussian's centre, σ. */
  sigmas: number;
  /** Mean and covariance (xx, xy, yy) of the part inside the disc, in units of σ from the centre. */
  mean: [number, number];
  covariance: [number, number, number];
}

const OUTER = 96;
const INNER = 48;
/** Half-width about the likeliest point that is looked at, σ. */
const REACH = 8;
/** Farther than this the likeliest point alone stands for the part inside, σ. */
const FAR = 9;
const ANGLES = 720;

/**
 * Moments of a Gaussian cut to a disc about the origin, by the midpoint rule.
 *
 * @param centre of the Gaussian on its principal axes, km
 * @param sigma  along these axes, km, above zero
 * @param radius of the disc, km
 */
export function captureMoments(
  centre: readonly [number, number],
  sigma: readonly [number, number],
  radius: number,
): CaptureMoments {
  const [x0, y0] = likeliest(centre, sigma, radius);
  const ax = (x0 - centre[0]) / sigma[0];
  const ay = (y0 - centre[1]) / sigma[1];
  const nearest = ax * ax + ay * ay;
  const sigmas = Math.sqrt(nearest);
  if (sigmas > FAR) {
    const small = 1 / nearest;
    return {
      probability: Math.exp(-nearest / 2),
      sigmas,
      mean: [ax, ay],
      covariance: [small, 0, small],
    };
  }
  let [w, mx, my, xx, xy, yy] = [0, 0, 0, 0, 0, 0];
  const fromX = Math.max(-radius, x0 - REACH * sigma[0]);
  const stepX = (Math.min(radius, x0 + REACH * sigma[0]) - fromX) / OUTER;
  for (let i = 0; i < OUTER; i++) {
    const x = fromX + (i + 0.5) * stepX;
    const half = Math.sqrt(Math.max(0, radius * radius - x * x));
    const y1 = Math.max(-half, Math.min(half, centre[1]));
    const fromY = Math.max(-half, y1 - REACH * sigma[1]);
    const stepY = (Math.min(half, y1 + REACH * sigma[1]) - fromY) / INNER;
    const a = (x - centre[0]) / sigma[0];
    for (let j = 0; j < INNER; j++) {
      const b = (fromY + (j + 0.5) * stepY - centre[1]) / sigma[1];
      const mass = Math.exp(-0.5 * (a * a + b * b - nearest)) * stepX * stepY;
      w += mass;
      mx += mass * a;
      my += mass * b;
      xx += mass * a * a;
      xy += mass * a * b;
      yy += mass * b * b;
    }
  }
  mx /= w;
  my /= w;
  return {
    probability: (w * Math.exp(-nearest / 2)) / (2 * Math.PI * sigma[0] * sigma[1]),
    sigmas,
    mean: [mx, my],
    covariance: [xx / w - mx * mx, xy / w - mx * my, yy / w - my * my],
  };
}

/** The point of the disc with the highest density: the centre itself, or one on the rim. */
function likeliest(
  [cx, cy]: readonly [number, number],
  [sx, sy]: readonly [number, number],
  radius: number,
): [number, number] {
  if (cx * cx + cy * cy <= radius * radius) return [cx, cy];
  const value = (angle: number): number =>
    ((radius * Math.cos(angle) - cx) / sx) ** 2 + ((radius * Math.sin(angle) - cy) / sy) ** 2;
  let best = 0;
  for (let i = 1; i < ANGLES; i++) {
    const angle = (i * 2 * Math.PI) / ANGLES;
    if (value(angle) < value(best)) best = angle;
  }
  let step = (2 * Math.PI) / ANGLES;
  while (step > 1e-12) {
    if (value(best + step) < value(best)) best += step;
    else if (value(best - step) < value(best)) best -= step;
    else step /= 2;
  }
  return [radius * Math.cos(best), radius * Math.sin(best)];
}
