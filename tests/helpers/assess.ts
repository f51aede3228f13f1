import { readFileSync } from 'node:fs';
import { runAssessment } from '../../core/assess';
import type { OrbitCase, ReadResult } from '../../core/case/types';
import { Trajectory } from '../../core/dynamics/trajectory';
import { createEphemeris } from '../../core/ephemeris';
import type { AssessEvent } from '../../core/events';
import type { Report } from '../../core/report/report';

/** Runs the core in the test's own process on a case that needs no reading. */

export const MADE_AT = '2026-12-01T00:00:00Z';

/** The packed files straight from `public/`. */
export async function fetchPacked(name: string): Promise<ArrayBuffer> {
  const bytes = readFileSync(new URL(`../../public/ephemeris/${name}`, import.meta.url));
  return bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength) as ArrayBuffer;
}

export const NO_READING: ReadResult = {
  format: null,
  fields: [],
  problems: [],
  questions: [],
  case: null,
};

/** A heliocentric Cartesian case with everything else at its default. */
export function caseOf(
  part: Pick<OrbitCase, 'epoch' | 'state' | 'axes'> & Partial<OrbitCase>,
): OrbitCase {
  return {
    name: 'test',
    objectId: null,
    invented: true,
    originator: null,
    centre: 'Sun',
    covariance: null,
    nonGravitational: null,
    physical: {},
    model: { gm: 'DE431' },
    span: null,
    ...part,
  };
}

const ephemeris = createEphemeris();

export async function assessCase(
  orbit: OrbitCase,
  emit: (event: AssessEvent) => void = () => {},
): Promise<{ report: Report; trajectory: Trajectory }> {
  const trajectory = new Trajectory();
  const report = await runAssessment(
    { text: '', reading: NO_READING, case: orbit, madeAt: MADE_AT },
    ephemeris,
    {
      fetchFile: fetchPacked,
      emit: (event) => {
        if (event.type === 'states') trajectory.append(event.direction, event.samples);
        emit(event);
      },
      pause: async () => {},
      cancelled: () => false,
    },
  );
  return { report, trajectory };
}
