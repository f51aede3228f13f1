import { describe, expect, it } from 'vitest';
import { clockReading } from '../../app/ribbon/clock-reading';
import { eventsOf } from '../../app/ribbon/events';
import { advance, PACES, paceWords, REDUCED_STEP } from '../../app/ribbon/pace';
import { firstReportOfTrajectory, reportOfTrajectory } from '../../app/ribbon/shown-report';
import { keyMove } from '../../app/ribbon/slider-keys';
import { jumpToEvent, togglePlaying } from '../../app/ribbon/transport';
import { createClock } from '../../app/store/clock';
import { createDeskStore } from '../../app/store/store';
import { Trajectory } from '../../app/worker/trajectory';
import type { Crossing, Report } from '../../core/report/report';
import { inventedReport } from './fixtures/report';
import { evenTimes, straightTrajectory } from './ribbon-straight-path';

const DAY = 86400;

function crossing(
  boundary: Crossing['boundary'],
  direction: Crossing['direction'],
  tdbSeconds: number,
): Crossing {
  const instant = { jdTdb: 2451545 + tdbSeconds / DAY, utc: '2000-01-01T12:00:00.000Z' };
  return { boundary, direction, tdbSeconds, ...instant, distanceKm: 6478, speedKmS: 12 };
}

/** The invented report with crossings on its principal approach and a pass of the Moon before it. */
function report(crossings: Crossing[], surfaceSeconds: number | null = null): Report {
  const base = inventedReport();
  const [earth] = base.approaches;
  const surfaceImpact = {
    jdTdb: 2451545,
    tdbSeconds: surfaceSeconds ?? 0,
    utc: '2000-01-01T12:00:00.000Z',
    latitudeDeg: 0,
    longitudeDeg: 0,
    speedKmS: 12,
    flightPathAngleDeg: -40,
    note: '',
  };
  return {
    ...base,
    approaches: [
      { ...earth, body: 'Moon', tdbSeconds: 20000, distanceKm: 149771 },
      { ...earth, crossings, ...(surfaceSeconds === null ? {} : { surfaceImpact }) },
    ],
    principal: 1,
  };
}

describe('the events of a report', () => {
  it('stand in order of time, with the crossings of the principal approach', () => {
    const events = eventsOf(
      report([crossing('geosynchronous', 'in', 40000), crossing('geosynchronous', 'out', 46000)]),
    );
    expect(events.map((event) => [event.tdbSeconds, event.label])).toEqual([
      [20000, 'Closest to the Moon'],
      [40000, 'Comes inside the geosynchronous distance'],
      [43200, 'Closest to the Earth'],
      [46000, 'Leaves the geosynchronous distance'],
    ]);
  });

  it('show the ground and not a periapsis beneath it', () => {
    const events = eventsOf(
      report([crossing('entry-interface', 'in', 43000), crossing('ground', 'in', 43010)], 43010),
    );
    expect(events.map((event) => [event.tdbSeconds, event.label])).toEqual([
      [20000, 'Closest to the Moon'],
      [43000, 'Meets the entry interface'],
      [43010, 'Meets the ground'],
    ]);
  });

  it('name the entry sphere only where the entry interface is not met', () => {
    const both = [crossing('entry-sphere', 'in', 42999), crossing('entry-interface', 'in', 43000)];
    expect(eventsOf(report(both)).map((event) => event.flag)).not.toContain('entry sphere');
    expect(eventsOf(report(both.slice(0, 1))).map((event) => event.flag)).toContain('entry sphere');
  });
});

describe('the report of the trajectory on the ribbon', () => {
  it('is none while a newer case streams in, and is there again when its own path is', () => {
    const own = new Trajectory();
    const shown = report([]);
    expect(reportOfTrajectory({ report: shown, trajectory: own })).toBe(shown);
    expect(reportOfTrajectory({ report: shown, trajectory: new Trajectory() })).toBeNull();
    expect(reportOfTrajectory({ report: shown, trajectory: own })).toBe(shown);
  });

  it('stays the first where clones only sharpen it, and changes with the case', () => {
    const own = new Trajectory();
    const [shown, sharper, other] = [report([]), report([]), report([])];
    expect(firstReportOfTrajectory({ report: shown, trajectory: own })).toBe(shown);
    expect(firstReportOfTrajectory({ report: sharper, trajectory: own })).toBe(shown);
    const next = new Trajectory();
    expect(firstReportOfTrajectory({ report: sharper, trajectory: next })).toBeNull();
    expect(firstReportOfTrajectory({ report: other, trajectory: next })).toBe(other);
  });
});

describe('the transport', () => {
  function desk() {
    const path = { missKm: 20000, speedKmS: 12, times: evenTimes(0, DAY, 100) };
    const trajectory = straightTrajectory(path);
    const store = createDeskStore({
      trajectory,
      report: report([crossing('geosynchronous', 'in', 40000)]),
    });
    return { store, clock: createClock(30000) };
  }

  it('jumps from event to event both ways and stays at the last', () => {
    const { store, clock } = desk();
    const seen: number[] = [];
    clock.subscribe(() => seen.push(clock.tdbSeconds));
    for (const direction of [1, 1, 1, -1, -1, -1] as const) {
      jumpToEvent({ store, clock }, direction);
    }
    expect(seen).toEqual([40000, 43200, 40000, 20000]);
  });

  it('stops play when it jumps', () => {
    const { store, clock } = desk();
    togglePlaying({ store, clock });
    expect(store.getState().playing).toBe(true);
    jumpToEvent({ store, clock }, 1);
    expect(store.getState().playing).toBe(false);
  });

  it('plays again from the start when it stands at the end', () => {
    const { store, clock } = desk();
    clock.set(DAY);
    togglePlaying({ store, clock });
    expect(clock.tdbSeconds).toBe(0);
    expect(store.getState().playing).toBe(true);
    togglePlaying({ store, clock });
    expect(store.getState().playing).toBe(false);
  });

  it('does not play what is not there', () => {
    const store = createDeskStore();
    togglePlaying({ store, clock: createClock() });
    expect(store.getState().playing).toBe(false);
  });
});

describe('play', () => {
  it('crosses the whole ribbon in the time its pace says, in frames or in steps', () => {
    for (const step of [0, REDUCED_STEP]) {
      let unit = 0;
      let carried = 0;
      let seconds = 0;
      let moves = 0;
      while (unit < 1 && seconds < 1000) {
        const next = advance(unit, 1 / 60, 'normal', carried, step);
        if (next.unit > unit) moves += 1;
        ({ unit, carried } = next);
        seconds += 1 / 60;
      }
      // A frame more than 36 s at most for smooth play; stepping waits for a frame at each step.
      expect(seconds).toBeGreaterThan(1 / PACES.normal - 0.02);
      expect(seconds).toBeLessThan(1 / PACES.normal + (step === 0 ? 0.04 : 48 / 60 + 0.04));
      if (step > 0) expect(moves).toBeLessThanOrEqual(48);
    }
  });

  it('writes how much time a second covers', () => {
    // 36 s for a ribbon at normal pace: 414 720 s of time a ribbon is 11 520 s = 3.2 h a second.
    expect(paceWords(414720, 'normal').replaceAll('\u2009', ' ')).toBe('1 s = 3.2 h');
  });
});

describe('the keys of the slider', () => {
  it('step, leap, page and go to the ends, and never past them', () => {
    expect(keyMove('ArrowRight', false, 0.5)).toBeCloseTo(0.5025, 12);
    expect(keyMove('ArrowLeft', true, 0.5)).toBeCloseTo(0.475, 12);
    expect(keyMove('PageUp', false, 0.5)).toBeCloseTo(0.6, 12);
    expect(keyMove('PageDown', false, 0.05)).toBe(0);
    expect(keyMove('Home', false, 0.5)).toBe(0);
    expect(keyMove('End', false, 0.5)).toBe(1);
    expect(keyMove('Tab', false, 0.5)).toBeNull();
  });
});

describe('the reading at the clock', () => {
  const anchor = { centreTdbSeconds: 0, scaleSeconds: 2000, words: 'closest approach' };
  const trajectory = straightTrajectory({
    missKm: 30000,
    speedKmS: 10,
    times: evenTimes(-DAY, DAY, 200),
  });

  it('gives distance and rate of the straight path', () => {
    // At −4 000 s: 40 000 km along and 30 000 km aside are 50 000 km; the rate is −10 · 40/50 km/s.
    const reading = clockReading(trajectory, anchor, -4000);
    expect(reading?.distance.replaceAll('\u2009', ' ')).toBe('50 000 km');
    expect(reading?.rate.replaceAll('\u2009', ' ')).toBe('\u22128.00 km/s');
    expect(reading?.spoken).toContain('before closest approach');
  });

  it('shows milliseconds only within the time scale of the passage', () => {
    expect(clockReading(trajectory, anchor, -1000)?.moment).toMatch(/:\d\d\.\d{3}$/);
    expect(clockReading(trajectory, anchor, -40000)?.moment).toMatch(/:\d\d$/);
  });

  it('says nothing before there is a trajectory', () => {
    expect(clockReading(new Trajectory(), anchor, 0)).toBeNull();
  });
});
