import type { LineOfVariations } from '../../core/report/report';
import { type Projection, roundStep } from './plane-geometry';

/** The line of variations on the sheet. */
export interface PlaneLine {
  /** Of an SVG path. */
  path: string;
  /** At whole σ: the middle of the tick, its direction across the line, and what stands beside it. */
  ticks: { sigma: number; x: number; y: number; nx: number; ny: number; words: string }[];
}

/** Ticks nearer than this to one another are left out, px. */
const LEAST_TICK_PX = 30;

/** Where a point of the line lies on the sheet. */
function at({ x0, xT, xR, y0, yT, yR }: Projection, one: LineOfVariations[number]) {
  const { bDotTKm: t, bDotRKm: r } = one;
  return { x: x0 + xT * t + xR * r, y: y0 + yT * t + yR * r };
}

/**
 * The line of variations, curved as its points are, with ticks at whole σ.
 *
 * @param line in order of sigma
 */
export function planeLine(line: LineOfVariations, project: Projection): PlaneLine {
  const places = line.map((one) => at(project, one));
  const path = places.map(({ x, y }, i) => `${i === 0 ? 'M' : 'L'}${x.toFixed(2)} ${y.toFixed(2)}`);
  const all: PlaneLine['ticks'] = [];
  for (let i = 0; i + 1 < line.length; i++) {
    const [from, to] = [line[i].sigma, line[i + 1].sigma];
    // + 0: the nought of σ has no sign.
    // A point that lies on a whole σ belongs to the interval that it ends; the first to its own.
    for (let sigma = Math.ceil(from) + 0; sigma <= to; sigma++) {
      if (sigma === from && i > 0) continue;
      const share = (sigma - from) / (to - from);
      const [a, b] = [places[i], places[i + 1]];
      const [dx, dy] = [b.x - a.x, b.y - a.y];
      const length = Math.hypot(dx, dy);
      if (length === 0) continue;
      all.push({
        sigma,
        x: a.x + share * dx,
        y: a.y + share * dy,
        nx: -dy / length,
        ny: dx / length,
        words: sigmaWords(sigma),
      });
    }
  }
  return { path: path.join(''), ticks: spaced(all) };
}

/** Only every second, fifth, tenth … σ where the ticks would crowd. */
function spaced(ticks: PlaneLine['ticks']): PlaneLine['ticks'] {
  if (ticks.length < 2) return ticks;
  const apart = ticks
    .slice(1)
    .map((tick, i) => Math.hypot(tick.x - ticks[i].x, tick.y - ticks[i].y));
  const median = apart.sort((a, b) => a - b)[Math.floor(apart.length / 2)];
  if (median === 0) return [];
  const every = roundStep(Math.max(1, LEAST_TICK_PX / median));
  const kept = ticks.filter(({ sigma }) => sigma % every === 0);
  // One alone says nothing of the scale.
  return kept.length > 1 ? kept : [];
}

/** "−2 σ", "0". */
function sigmaWords(sigma: number): string {
  if (sigma === 0) return '0';
  return `${sigma < 0 ? '\u2212' : '+'}${Math.abs(sigma)}\u2009σ`;
}
