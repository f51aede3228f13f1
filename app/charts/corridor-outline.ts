import type { MultiLineString, Position } from 'geojson';
import type { ReportCorridor } from '../../core/report/corridor';

type Cell = ReportCorridor['cells'][number];

/** Latitudes and longitudes of neighbouring cells are the same numbers up to rounding. */
const keyOf = (degrees: number): string => degrees.toFixed(9);

/**
 * The line about the densest cells that together hold a share of the probability: every piece of a
 * side with a cell of them on one hand only.
 *
 * @param level share of the probability, (0, 1]
 */
export function outlineOf(cells: readonly Cell[], level: number): MultiLineString {
  // Up to the cell with which the share is reached.
  const reached = cells.findIndex(({ within }) => within >= level - 1e-12);
  const inside = reached < 0 ? cells : cells.slice(0, reached + 1);
  return { type: 'MultiLineString', coordinates: [...meridians(inside), ...parallels(inside)] };
}

function meridians(cells: readonly Cell[]): Position[][] {
  const sides = new Map<string, Position[]>();
  for (const { boundsDeg } of cells) {
    const [west, south, east, north] = boundsDeg;
    for (const longitude of [west, east]) {
      const key = `${keyOf(south)} ${keyOf(longitude >= 180 ? longitude - 360 : longitude)}`;
      // A side met twice lies between two of the cells.
      if (!sides.delete(key)) {
        sides.set(key, [
          [longitude, south],
          [longitude, north],
        ]);
      }
    }
  }
  return [...sides.values()];
}

interface Step {
  longitude: number;
  below: number;
  above: number;
}

function parallels(cells: readonly Cell[]): Position[][] {
  const rows = new Map<string, { latitude: number; steps: Step[] }>();
  const note = (latitude: number, [west, , east]: Cell['boundsDeg'], isBelow: boolean) => {
    const key = keyOf(latitude);
    const row = rows.get(key) ?? { latitude, steps: [] };
    rows.set(key, row);
    const one = { below: isBelow ? 1 : 0, above: isBelow ? 0 : 1 };
    row.steps.push(
      { longitude: west, ...one },
      { longitude: east, below: -one.below, above: -one.above },
    );
  };
  for (const { boundsDeg } of cells) {
    note(boundsDeg[1], boundsDeg, false);
    note(boundsDeg[3], boundsDeg, true);
  }
  return [...rows.values()]
    .filter(({ latitude }) => Math.abs(latitude) < 90 - 1e-9)
    .flatMap(({ latitude, steps }) => oneSided(latitude, steps));
}

/** The stretches of a parallel that have cells below or above it, and not both. */
function oneSided(latitude: number, steps: Step[]): Position[][] {
  steps.sort((a, b) => a.longitude - b.longitude);
  const lines: Position[][] = [];
  let below = 0;
  let above = 0;
  for (const [i, step] of steps.entries()) {
    below += step.below;
    above += step.above;
    const next = steps[i + 1];
    if (next === undefined || next.longitude - step.longitude < 1e-9) continue;
    if (below > 0 === above > 0) continue;
    lines.push([
      [step.longitude, latitude],
      [next.longitude, latitude],
    ]);
  }
  return lines;
}
