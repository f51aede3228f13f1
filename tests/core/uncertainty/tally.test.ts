import { describe, expect, it } from 'vitest';
import { BODY_INDEX, SECONDS_PER_DAY } from '../../../core/constants';
import { CLONE_OUTCOME, CLONE_ROW } from '../../../core/uncertainty/clones';
import { groupImpacts, ImpactTally } from '../../../core/uncertainty/tally';

/** Rows of invented impacts: body, day of entry, entry speed. */
function rowsOf(
  impacts: readonly (readonly ['Earth' | 'Moon', number, number])[],
  outcome: number = CLONE_OUTCOME.impact,
): Float64Array {
  const rows = new Float64Array(impacts.length * CLONE_ROW.size).fill(Number.NaN);
  for (const [i, [body, day, speed]] of impacts.entries()) {
    const at = i * CLONE_ROW.size;
    rows[at + CLONE_ROW.clone] = i;
    rows[at + CLONE_ROW.body] = BODY_INDEX[body];
    rows[at + CLONE_ROW.outcome] = outcome;
    rows[at + CLONE_ROW.entrySpeedKmS] = speed;
    const time = body === 'Earth' ? CLONE_ROW.entryTdbSeconds : CLONE_ROW.groundTdbSeconds;
    rows[at + time] = day * SECONDS_PER_DAY;
  }
  return rows;
}

describe('impacts gathered by date', () => {
  const rows = rowsOf([
    ['Earth', 400, 20],
    ['Earth', 10, 12],
    ['Moon', 11, 5],
    ['Earth', 12, 14],
  ]);

  it('are parted by body and by gaps of thirty days, in order of time', () => {
    const groups = groupImpacts(rows, null);
    expect(groups.map(({ body, count }) => [body, count])).toEqual([
      [BODY_INDEX.Earth, 2],
      [BODY_INDEX.Moon, 1],
      [BODY_INDEX.Earth, 1],
    ]);
    expect(groups[0].firstTdbSeconds).toBe(10 * SECONDS_PER_DAY);
    expect(groups[0].lastTdbSeconds).toBe(12 * SECONDS_PER_DAY);
  });

  it('have means by their weights', () => {
    const [first] = groupImpacts(rows, Float64Array.of(1, 3, 1, 1));
    expect(first.weight).toBe(4);
    expect(first.weight2).toBe(10);
    expect(first.speedKmS).toBeCloseTo((3 * 12 + 14) / 4, 12);
    expect(first.meanTdbSeconds).toBeCloseTo(10.5 * SECONDS_PER_DAY, 6);
    expect(Number.isNaN(first.excessSpeedKmS)).toBe(true);
  });
});

describe('the tally', () => {
  it('counts the impacts of every batch, and passes over what only passes', () => {
    const tally = new ImpactTally();
    tally.add(
      rowsOf([
        ['Earth', 10, 12],
        ['Moon', 10, 5],
      ]),
    );
    tally.add(rowsOf([['Earth', 11, 12]]));
    tally.add(rowsOf([['Earth', 11, 12]], CLONE_OUTCOME.atmosphere));
    expect(tally.earth).toBe(2);
    expect(tally.groups().map(({ body, count }) => [body, count])).toEqual([
      [BODY_INDEX.Earth, 2],
      [BODY_INDEX.Moon, 1],
    ]);
  });

  it('counts more impacts than it keeps', () => {
    const tally = new ImpactTally();
    const many = rowsOf(
      Array.from({ length: 20_000 }, (_, i) => ['Earth', 10 + (i % 3), 12] as const),
    );
    for (let i = 0; i < 4; i++) tally.add(many);
    const [group] = tally.groups();
    expect(tally.earth).toBe(80_000);
    expect(group.count).toBe(80_000);
    expect(group.rows.length / CLONE_ROW.size).toBe(50_000);
  });
});
