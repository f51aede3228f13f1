import type { NormalisedCase } from '../case/normalise';
import type { AssessInput } from '../events';
import { jdFromTdbSeconds } from '../time/convert';
import { formatIso } from '../time/format';
import type { Report } from './report';

/** The case as read, as assumed and as normalised. */
export function caseSection(
  input: Pick<AssessInput, 'text' | 'reading' | 'case'>,
  normalised: NormalisedCase,
): Report['case'] {
  const { text, reading, case: orbit } = input;
  return {
    name: orbit.name,
    objectId: orbit.objectId,
    invented: orbit.invented,
    asRead: {
      format: reading.format ?? 'unknown',
      text,
      fields: reading.fields.map(({ field, value, unit, origin }) => ({
        field,
        value,
        unit,
        origin,
      })),
      notes: reading.problems.map((problem) => problem.message),
    },
    asAssumed: reading.fields.flatMap(({ field, value, origin, note }) =>
      origin === 'read' || value === '' ? [] : [{ field, value, origin, note: note ?? '' }],
    ),
    normalised: {
      epochJdTdb: jdFromTdbSeconds(normalised.epochTdbSeconds),
      epochTdbSeconds: normalised.epochTdbSeconds,
      epochUtc: formatIso(normalised.epochTdbSeconds, 'UTC', 3),
      centre: 'Sun',
      axes: 'ICRF',
      positionKm: [...normalised.positionKm],
      velocityKmS: [...normalised.velocityKmS],
      a1KmS2: normalised.a1KmS2,
      a2KmS2: normalised.a2KmS2,
      a3KmS2: normalised.a3KmS2,
    },
    physical: Object.fromEntries(
      Object.entries(orbit.physical).filter(([, value]) => value !== undefined),
    ),
  };
}
