import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { corridorSchema } from '../../../core/report/corridor';
import { corridorFinding } from '../../../core/report/corridor-findings';
import { sampleCorridor } from './corridor-sample';

const plain = (text: string | undefined): string => (text ?? '').replaceAll('\u2009', ' ');

describe('the corridor in the report', () => {
  it('is what its schema says', () => {
    expect(v.safeParse(corridorSchema, sampleCorridor()).success).toBe(true);
    expect(v.safeParse(corridorSchema, sampleCorridor({ count: 1 })).success).toBe(true);
  });

  it('is in degrees and UTC, with the caution', () => {
    const corridor = sampleCorridor();
    expect(corridor.note).toContain('not a warning');
    expect(corridor.note).toContain('civil-protection authority');
    // TDB 1e9 s past J2000 is 2031-09-09 13:45:30.8 UTC: 11 574 d 01:46:40 after 2000-01-01
    // 12:00:00 TDB, less 69.184 s (TT − UTC with 37 leap seconds), by the calendar.
    expect(corridor.firstEntry.utc.slice(0, 16)).toBe('2031-09-09T13:45');
    for (const { axis } of corridor.pieces) {
      for (const { airFlightPathAngleDeg } of axis) {
        // The strip was made with angles from −20° to −60°.
        expect(airFlightPathAngleDeg[0]).toBeGreaterThanOrEqual(-60);
        expect(airFlightPathAngleDeg[2]).toBeLessThanOrEqual(-20);
      }
    }
    for (const { boundsDeg, latitudeDeg, longitudeDeg } of corridor.cells) {
      const [west, south, east, north] = boundsDeg;
      expect(latitudeDeg).toBeGreaterThan(south);
      expect(latitudeDeg).toBeLessThan(north);
      expect(longitudeDeg).toBeGreaterThan(west);
      expect(longitudeDeg).toBeLessThan(east);
    }
  });
});

describe('the finding about the corridor', () => {
  it('says from where to where, how long and how wide', () => {
    const finding = corridorFinding(sampleCorridor({ count: 4000 }), 'Take care.');
    // One radian is 6 371 km, less the halves of the end sections; 2 σ are 60 km.
    expect(plain(finding?.text)).toMatch(
      /^If it hits, it comes down on a strip from [\d.]+° [NS] [\d.]+° [EW] to [\d.]+° [NS] [\d.]+° [EW], 6 [23]00 km long and about (59|60|61) km wide \(2 σ\)\./,
    );
    expect(plain(finding?.text)).toContain('all within 15.0 min');
    expect(finding?.caution).toBe('Take care.');
  });

  it('says of a single clone that the shape is hardly known', () => {
    const finding = corridorFinding(sampleCorridor({ count: 1 }), null);
    expect(plain(finding?.text)).toMatch(/^If it hits, it comes down near /);
    expect(plain(finding?.text)).toContain('rests on 1 impacting clone,');
    expect(plain(finding?.text)).not.toContain('wide');
  });
});
