import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FindingsDraft } from '../../../core/report/finding';
import { writeFindings } from '../../../core/report/findings';
import type { Approach, Finding } from '../../../core/report/report';
import {
  CLASSICAL,
  COMPARISON,
  draftOf,
  farPass,
  GRAZE,
  IMPACT,
  instantOf,
  MOON_IMPACT,
  PASS,
} from './drafts';

/**
 * The sentences about hand-made drafts with invented numbers. What a sentence must say is worked out
 * here from the draft's numbers: digits and grouping by the platform's `Intl`, dates by its calendar.
 */

const THIN = '\u2009';

/** A number as the platform rounds and groups it, with the desk's thin spaces and true minus. */
const said = (value: number, decimals = 0): string =>
  new Intl.NumberFormat('en-GB', {
    minimumFractionDigits: decimals,
    maximumFractionDigits: decimals,
  })
    .format(value)
    .replaceAll(',', THIN)
    .replace('-', '\u2212');

const DAY_FORM = new Intl.DateTimeFormat('en-GB', {
  year: 'numeric',
  month: 'long',
  day: 'numeric',
  timeZone: 'UTC',
});

/** "2041 March 9" of the draft's UTC text. */
function day(utc: string): string {
  const parts = new Map(
    DAY_FORM.formatToParts(new Date(utc)).map(({ type, value }) => [type, value]),
  );
  return `${parts.get('year')} ${parts.get('month')} ${parts.get('day')}`;
}

/** "2041 March 9 at 04:05:06 UTC", to the nearest second. */
function moment(utc: string): string {
  const rounded = new Date(Math.round(Date.parse(utc) / 1000) * 1000).toISOString();
  return `${day(rounded)} at ${rounded.slice(11, 19)} UTC`;
}

const answerTo = (draft: FindingsDraft): Finding => writeFindings(draft).findings[0];

function find(draft: FindingsDraft, id: string): Finding {
  const found = writeFindings(draft).findings.find((item) => item.id === id);
  if (found === undefined) throw new Error(`no finding ${id}`);
  return found;
}
const ids = (draft: FindingsDraft): string[] => writeFindings(draft).findings.map((f) => f.id);

const WARNING = /not a warning.*responsible civil-protection authority/;

const UNCERTAIN: Approach = {
  ...PASS,
  uncertainty: {
    sigmaDistanceKm: 432.1,
    sigmaTimeS: 3.77,
    sigmaSpeedKmS: 0.01234,
    distance3SigmaKm: [20049.4, 22641.9],
    ellipse: {
      semiMajorKm: 511.6,
      semiMinorKm: 8.83,
      angleTrDeg: 41,
      angleXiZetaDeg: 88,
      covarianceKm2: [1e5, 2e4, 1e5],
    },
    stretchingEarthRadiiPerSigma: 0.08,
  },
  impactProbability: { firstOrder: 0.000434 },
};

/** One draft of every kind that the report can be of. */
const DRAFTS: Record<string, FindingsDraft> = {
  pass: draftOf([PASS, farPass('Venus', '2041-06-01T12:00:00', 2.2e7)]),
  'pass with a covariance': draftOf([UNCERTAIN]),
  'bound pass': draftOf([{ ...PASS, excessSpeedKmS: null, hyperbola: null, targetPlane: null }], {
    comparison: null,
  }),
  graze: draftOf([GRAZE]),
  impact: draftOf([IMPACT]),
  'impact on the Moon': draftOf([MOON_IMPACT], { comparison: null }),
  nothing: draftOf([], { comparison: null }),
  'nothing at all known': draftOf([], { comparison: null, classical: null }),
};

describe('every finding', () => {
  it('is made of whole sentences without a hole, an exclamation or an alarm word', () => {
    for (const draft of Object.values(DRAFTS)) {
      for (const { text, caution } of writeFindings(draft).findings) {
        for (const words of [text, caution ?? text]) {
          expect(words).toMatch(/^[A-Z0-9].*\.$/);
          expect(words).not.toMatch(/NaN|undefined|null|Infinity|!|\s\s/);
          expect(words).not.toMatch(
            /threat|danger|catastroph|disaster|doom|deadly|terrible|alarm/i,
          );
        }
      }
    }
  });

  it('takes its figures from the draft and nowhere else', () => {
    const numbersOf = (value: unknown): number[] => {
      if (typeof value === 'number') return [value];
      return typeof value === 'object' && value !== null
        ? Object.values(value).flatMap(numbersOf)
        : [];
    };
    for (const draft of Object.values(DRAFTS)) {
      const known = new Set(numbersOf(draft));
      for (const { figures, tdbSeconds } of writeFindings(draft).findings) {
        for (const { value } of figures) expect(known).toContain(value);
        if (tdbSeconds !== null) expect(known).toContain(tdbSeconds);
      }
    }
  });

  it('writes each figure within half a unit of its last digit', () => {
    let seen = 0;
    for (const draft of Object.values(DRAFTS)) {
      for (const { figures } of writeFindings(draft).findings) {
        for (const { value, text, unit } of figures) {
          if (unit === '') continue;
          const plain = text.replaceAll(THIN, '').replace('\u2212', '-');
          const decimals = plain.split('.')[1]?.length ?? 0;
          // 1e-9: the rounding of the subtraction itself.
          const half = 0.5 * 10 ** -decimals + 1e-9 * Math.abs(value);
          expect(Math.abs(Number(plain) - value)).toBeLessThanOrEqual(half);
          seen += 1;
        }
      }
    }
    expect(seen).toBeGreaterThan(50);
  });

  it('has an id of its own, and the first alone is the answer', () => {
    for (const draft of Object.values(DRAFTS)) {
      const { findings } = writeFindings(draft);
      expect(new Set(findings.map((item) => item.id)).size).toBe(findings.length);
      expect(findings.map((item) => item.kind === 'answer')).toEqual(
        findings.map((_, i) => i === 0),
      );
      expect(findings[0].id).toBe('answer');
    }
  });

  it('says where it comes from', () => {
    for (const draft of Object.values(DRAFTS)) {
      for (const { basis } of writeFindings(draft).findings) {
        for (const part of Object.values(basis)) expect(part.length).toBeGreaterThan(3);
      }
    }
  });
});

describe('the answer', () => {
  it('of a pass gives distance, radii and moment', () => {
    expect(answerTo(draftOf([PASS])).text).toMatch(
      `Passes ${said(21345.678)}${THIN}km from Earth’s centre, 3.3 Earth radii, on ${moment(PASS.utc)}.`,
    );
    expect(answerTo(draftOf([PASS])).tdbSeconds).toBe(PASS.tdbSeconds);
  });

  it('of a pass names the innermost distance it stays inside of', () => {
    fc.assert(
      fc.property(fc.double({ min: 6600, max: 1e6, noNaN: true }), (distanceKm) => {
        const { text } = answerTo(draftOf([{ ...PASS, distanceKm }]));
        // Radii of common practice, km: 2 000 km over the equator, geosynchronous, the Moon's mean.
        const shell = distanceKm < 8378.137;
        const geosynchronous = !shell && distanceKm < 42164;
        const moon = !shell && !geosynchronous && distanceKm < 384400;
        expect(text.includes('inside the shell of low orbits')).toBe(shell);
        expect(text.includes('inside the geosynchronous distance')).toBe(geosynchronous);
        expect(text.includes('inside the Moon’s mean distance')).toBe(moon);
        // Within 50 000 km the height over the equatorial radius of WGS 84 is said, in whole km.
        const height = /([\d\u2009]+)\u2009km above the Earth’s equatorial radius/.exec(text);
        expect(height !== null).toBe(distanceKm < 50000);
        if (height === null) return;
        const heightKm = Number(height[1].replaceAll(THIN, ''));
        expect(Math.abs(heightKm - (distanceKm - 6378.137))).toBeLessThanOrEqual(0.5 + 1e-9);
      }),
    );
  });

  it('of a pass of another body measures in that body', () => {
    const venus = farPass('Venus', '2041-06-01T12:00:00', 654321.4);
    expect(answerTo(draftOf([venus], { comparison: null })).text).toBe(
      `Passes ${said(654321)}${THIN}km from the centre of Venus, ${said(131)} of its radii, on ${moment(venus.utc)}.`,
    );
  });

  it('gives the time give or take where there is a covariance, and only there', () => {
    expect(answerTo(draftOf([UNCERTAIN])).text).toContain(`UTC ±${THIN}3.8${THIN}s (1${THIN}σ)`);
    expect(answerTo(draftOf([PASS])).text).not.toContain('±');
  });

  it('tells a pass of the Moon within ten lunar radii, and no farther one', () => {
    const moon = (distanceRadii: number): Approach => ({
      ...farPass('Moon', '2041-03-08T20:00:00', distanceRadii * 1737.4),
      distanceRadii,
    });
    expect(answerTo(draftOf([PASS, moon(9.9)])).text).toMatch(
      `It comes within ${said(9.9 * 1737.4)}${THIN}km of the Moon’s centre, 9.9 lunar radii, on 2041 March 8 at 20:00:00 UTC.`,
    );
    expect(answerTo(draftOf([PASS, moon(10.1)])).text).not.toContain('Moon’s centre');
  });

  it('of a graze gives the lowest point and says that drag is left out', () => {
    const { text } = answerTo(draftOf([GRAZE]));
    expect(text).toContain(
      `Reaches the atmosphere: its lowest point is ${said(6441.987)}${THIN}km from Earth’s centre, ${said(6441.987 - 6378.137)}${THIN}km above the Earth’s equatorial radius, on ${moment(GRAZE.utc)}.`,
    );
    expect(text).toContain('Without drag it leaves again; the air may');
  });

  it('of a graze over a pole, lower than the equator is high, says below', () => {
    const { text } = answerTo(draftOf([{ ...GRAZE, distanceKm: 6370 }]));
    expect(text).toContain(`8.1${THIN}km below the Earth’s equatorial radius`);
  });

  it('of an impact gives moment and place of the entry, not of the periapsis', () => {
    const { text, tdbSeconds } = answerTo(draftOf([IMPACT]));
    expect(text).toBe(
      `On this orbit it strikes the Earth: it enters the atmosphere, 100${THIN}km up, on ${moment('2041-03-09T04:03:02.750Z')}, over 12.35°${THIN}S 98.77°${THIN}E.`,
    );
    expect(tdbSeconds).toBe(instantOf('2041-03-09T04:03:02.750').tdbSeconds);
  });

  it('of an impact that begins below the interface gives the ground', () => {
    const { entry: _, ...inside } = IMPACT;
    expect(answerTo(draftOf([inside])).text).toBe(
      `On this orbit it strikes the Earth on ${moment('2041-03-09T04:03:14.350Z')}, over 12.99°${THIN}S 179.12°${THIN}W.`,
    );
  });

  it('of an impact on the Moon gives the place on the Moon', () => {
    expect(answerTo(draftOf([MOON_IMPACT])).text).toBe(
      `On this orbit it strikes the Moon on ${moment('2041-03-08T22:10:44.400Z')}, at 23.46°${THIN}N 34.57°${THIN}W.`,
    );
  });

  it('of an impact on a planet gives the moment of touching, not of the periapsis', () => {
    const touches = instantOf('2041-03-09T03:59:30.000');
    const ground = { ...IMPACT.crossings[3], ...touches };
    const { entry: _, surfaceImpact: __, ...plain } = IMPACT;
    const venus: Approach = { ...plain, body: 'Venus', crossings: [ground] };
    expect(answerTo(draftOf([venus])).text).toBe(
      'On this orbit it strikes Venus on 2041 March 9 at 03:59:30 UTC.',
    );
  });

  it('of a search that found nothing says what was looked for, how far out and when', () => {
    expect(answerTo(DRAFTS.nothing).text).toBe(
      `No approach was found from 2040 November 1 to 2041 December 2. Looked for: the Earth within 74.000 million${THIN}km, the Moon within 3.000 million${THIN}km.`,
    );
  });
});

describe('the cautions', () => {
  it('stand exactly where the Earth’s air or ground is reached, and where a case is invented', () => {
    const outcomes = ['pass', 'atmosphere', 'impact'] as const;
    const bodies = ['Earth', 'Moon', 'Venus', 'Mars', 'Mercury', 'Jupiter'] as const;
    const approach = fc.record({
      body: fc.constantFrom(...bodies),
      outcome: fc.constantFrom(...outcomes),
    });
    fc.assert(
      fc.property(fc.array(approach, { maxLength: 4 }), fc.boolean(), (list, invented) => {
        const base = draftOf(list.map((item) => ({ ...PASS, ...item })));
        const draft = { ...base, case: { ...base.case, invented } };
        const { findings, cautions } = writeFindings(draft);
        const reaches = list.some((item) => item.body === 'Earth' && item.outcome !== 'pass');
        expect(cautions.some((text) => WARNING.test(text))).toBe(reaches);
        expect(WARNING.test(findings[0].caution ?? '')).toBe(reaches);
        expect(cautions.some((text) => text.includes('invented'))).toBe(invented);
        expect(cautions).toHaveLength(Number(reaches) + Number(invented));
      }),
    );
  });

  it('stand with the entry and the ground point too', () => {
    for (const id of ['entry', 'ground']) {
      expect(find(DRAFTS.impact, id).caution).toMatch(WARNING);
    }
    expect(find(DRAFTS['impact on the Moon'], 'ground').caution).toBeNull();
  });
});

describe('the supporting findings', () => {
  it('give moment, place, speed, angle and heading of the entry against the air', () => {
    expect(find(DRAFTS.graze, 'entry').text).toBe(
      `It meets the entry interface, 100${THIN}km up, on ${moment('2041-03-09T04:03:02.750Z')} over 12.35°${THIN}S 98.77°${THIN}E, at 13.25${THIN}km/s through the air, 6.7° below the horizontal, heading 81° from north through east.`,
    );
    expect(ids(DRAFTS.pass)).not.toContain('entry');
  });

  it('call the ground point of a flight without air what it is', () => {
    const { text } = find(DRAFTS.impact, 'ground');
    expect(text).toContain(
      `Were there no air it would reach the ground at 12.99°${THIN}S 179.12°${THIN}W on ${moment('2041-03-09T04:03:14.350Z')}, at 13.70${THIN}km/s, 47.3° below the horizontal.`,
    );
    expect(text).toContain('The air changes that');
    expect(find(DRAFTS['impact on the Moon'], 'ground').text).toMatch(/^It meets the surface at /);
    expect(ids(DRAFTS.graze)).not.toContain('ground');
  });

  it('give excess speed and speed; none at closest for an impact, no excess where bound', () => {
    expect(find(DRAFTS.pass, 'speed').text).toBe(
      `It comes in with an excess speed of 7.65${THIN}km/s and moves at 9.88${THIN}km/s at its closest.`,
    );
    expect(find(DRAFTS.impact, 'speed').text).not.toContain('closest');
    expect(find(DRAFTS['bound pass'], 'speed').text).toBe(
      `It is bound to the Earth: it has no excess speed, and moves at 9.88${THIN}km/s at its closest.`,
    );
  });

  it('tell when it enters, how much later it is deepest, when it leaves', () => {
    // From the draft's crossings: 31 h 35 min 0.8 s between the two inward ones.
    expect(find(DRAFTS.pass, 'crossings').text).toBe(
      `It enters the Earth’s sphere of influence on ${moment('2041-03-07T19:31:07.100Z')} and comes inside the geosynchronous distance 31.6${THIN}h later; it leaves the Earth’s sphere of influence on ${moment('2041-03-10T12:41:13.700Z')}.`,
    );
    expect(find(DRAFTS.impact, 'crossings').text).toContain(
      'would reach the ground, were there no air,',
    );
    expect(find(DRAFTS.impact, 'crossings').text).not.toContain('leaves');
  });

  it('tell the miss without the Earth’s pull and with it', () => {
    const { text } = find(DRAFTS.pass, 'focusing');
    expect(text).toContain(`${said(27313.4)}${THIN}km`);
    expect(text).toContain(`focuses that to ${said(21345.678)}${THIN}km`);
    expect(text).toContain(`aims within ${said(11305.2)}${THIN}km meets the Earth`);
    expect(text).toContain('aims outside it');
  });

  it('say inside exactly when the impact parameter is below the impact radius', () => {
    const { hyperbola } = PASS;
    if (hyperbola === null) throw new Error('the draft has a hyperbola');
    for (const [impactParameterKm, word] of [
      [11305.1, 'inside'],
      [11305.3, 'outside'],
    ] as const) {
      const draft = draftOf([{ ...PASS, hyperbola: { ...hyperbola, impactParameterKm } }]);
      expect(find(draft, 'focusing').text).toContain(`aims ${word} it`);
    }
  });

  it('say nothing of focusing beyond the sphere of influence', () => {
    expect(ids(draftOf([{ ...PASS, distanceKm: 925001 }]))).not.toContain('focusing');
    expect(ids(draftOf([{ ...PASS, distanceKm: 924999 }]))).toContain('focusing');
  });

  it('set the classical answer beside the n-body one', () => {
    expect(find(DRAFTS.pass, 'classical-check').text).toContain(
      `an unperturbed miss of ${said(31313.1)}${THIN}km, focused to ${said(22222.2)}${THIN}km by the hyperbola, 20.6${THIN}min early; the n-body answer is ${said(21345.678)}${THIN}km.`,
    );
    expect(find(DRAFTS['bound pass'], 'classical-check').text).toContain('do not show this pass');
    expect(ids(DRAFTS.nothing)).not.toContain('classical-check');
  });

  it('say when the classical chain alone would have been read otherwise, and only then', () => {
    const alone = (principal: Approach, classicalPeriapsisKm: number | null, below: boolean) =>
      find(
        draftOf([principal], {
          comparison: { ...COMPARISON, classicalPeriapsisKm },
          classical: { ...CLASSICAL, periapsisBelowInterface: below },
        }),
        'classical-check',
      ).text;
    const read = /would have been read as (.*)\.$/;
    expect(alone(PASS, 22222.2, false)).not.toMatch(read);
    expect(alone(GRAZE, 6440, true)).not.toMatch(read);
    expect(alone(IMPACT, 3000, true)).not.toMatch(read);
    expect(read.exec(alone(PASS, 6440, true))?.[1]).toBe('a pass through the atmosphere');
    expect(read.exec(alone(PASS, 6000, true))?.[1]).toBe('an impact');
    expect(read.exec(alone(IMPACT, 7000, false))?.[1]).toBe('a pass');
    expect(read.exec(alone(IMPACT, null, false))?.[1]).toBe('a pass');
  });

  it('give the distance of the orbits, where the classical chain ran', () => {
    expect(find(DRAFTS.pass, 'moid').text).toContain(
      `${said(0.000453817, 5)}${THIN}au (${said(67890.1)}${THIN}km)`,
    );
    expect(ids(DRAFTS['nothing at all known'])).not.toContain('moid');
  });

  it('give the turn of the orbit, an open one by its periapsis', () => {
    expect(find(DRAFTS.pass, 'orbit-change').text).toBe(
      'The pass turns its orbit about the Sun from a = 1.2346\u2009au, e = 0.432, i = 5.43° to a = 1.3457\u2009au, e = 0.457, i = 6.54°.',
    );
    const { orbitAfter } = PASS;
    if (orbitAfter === undefined) throw new Error('the draft has an orbit after');
    const open = { ...orbitAfter, semiMajorAxisAu: -3.1, eccentricity: 1.2345, periodDays: null };
    expect(find(draftOf([{ ...PASS, orbitAfter: open }]), 'orbit-change').text).toContain(
      'to an open orbit with q = 0.7311\u2009au, e = 1.234',
    );
    expect(ids(DRAFTS.impact)).not.toContain('orbit-change');
  });

  it('count the other approaches, name the nearest and the next, leave out the Moon of this pass', () => {
    const moonOfPass = farPass('Moon', '2041-03-08T20:00:00', 200000);
    const next = farPass('Moon', '2041-04-02T08:00:00', 1.5e6);
    const nearest = farPass('Earth', '2041-09-30T16:00:00', 765432.1);
    const text = (others: Approach[]): string =>
      find(draftOf([PASS, ...others]), 'other-approaches').text;
    expect(text([moonOfPass, next, nearest])).toBe(
      `2 other approaches from 2040 November 1 to 2041 December 2; the nearest is ${said(765432.1)}${THIN}km from Earth’s centre on 2041 September 30. The next is 1.500 million${THIN}km from the Moon’s centre on 2041 April 2.`,
    );
    expect(text([next])).toBe(
      `One other approach from 2040 November 1 to 2041 December 2: 1.500 million${THIN}km from the Moon’s centre on 2041 April 2.`,
    );
    expect(ids(draftOf([PASS, moonOfPass]))).not.toContain('other-approaches');
  });

  it('do not hide another approach that reaches air or ground', () => {
    const later: Approach = { ...GRAZE, ...instantOf('2041-10-10T10:10:10'), distanceKm: 6450 };
    const { text } = find(draftOf([PASS, later]), 'other-approaches');
    expect(text).toMatch(/On 2041 October 10 it reaches the atmosphere\.$/);
  });

  it('say how sure the figures are, or that it is not known', () => {
    const { text } = find(DRAFTS['pass with a covariance'], 'certainty');
    expect(text).toContain(`distance ±${THIN}${said(432.1)}${THIN}km, time ±${THIN}3.8${THIN}s`);
    expect(text).toContain(`${said(20049.4)}${THIN}km to ${said(22641.9)}${THIN}km`);
    // 1 / 0.000434 = 2304, to two figures.
    expect(text).toContain(`1 in 2${THIN}300 at first order`);
    expect(find(DRAFTS.pass, 'certainty').text).toMatch(/^No covariance was used/);
    expect(find(DRAFTS.nothing, 'certainty').text).toMatch(/nominal orbit alone/);
  });

  it('never write a small standard deviation as zero', () => {
    const { uncertainty } = UNCERTAIN;
    if (uncertainty === undefined) throw new Error('the draft has an uncertainty');
    const sharp = {
      ...UNCERTAIN,
      uncertainty: {
        ...uncertainty,
        sigmaDistanceKm: 0.0123,
        sigmaTimeS: 0.0041,
        sigmaSpeedKmS: 1.3e-7,
      },
    };
    const { text, figures } = find(draftOf([sharp]), 'certainty');
    expect(text).toContain(`distance ±${THIN}12${THIN}m, time ±${THIN}0.0041${THIN}s`);
    for (const figure of figures) expect(figure.text).toMatch(/[1-9]/);
  });

  it('list what was assumed and what was set by hand', () => {
    const base = draftOf([PASS]);
    const fields = [
      { field: 'axes', value: 'ICRF', origin: 'assumed', note: '' },
      { field: 'timeScale', value: 'TDB', origin: 'assumed', note: '' },
      { field: 'gm', value: 'DE405', origin: 'edited', note: '' },
    ] as const;
    const text = (asAssumed: FindingsDraft['case']['asAssumed']): string =>
      find({ ...base, case: { ...base.case, asAssumed } }, 'assumptions').text;
    expect(text([...fields])).toBe(
      '2 fields are not, or not wholly, in the text and were assumed: axes ICRF; time scale TDB. Set by hand: gravitational parameters DE405.',
    );
    expect(text([fields[0]])).toBe(
      'One field is not, or not wholly, in the text and was assumed: axes ICRF.',
    );
    expect(text([fields[2]])).toBe('Set by hand: gravitational parameters DE405.');
    expect(ids(base)).not.toContain('assumptions');
  });
});
