import { readFileSync } from 'node:fs';
import type { Epoch, OrbitCase } from '../../core/case/types';
import { AU_KM, JD_J2000, SECONDS_PER_DAY } from '../../core/constants';
import { caseOf } from './assess';

/** The open small-body record of tests/checks/data (source in its header) as a case. */

interface SmallBodyRecord {
  orbit: {
    epoch: string;
    elements: { label: string; value: string }[];
    model_pars: { name: string; value: string }[];
  };
  ca_data: ApproachRow[];
}

export interface ApproachRow {
  jd: string;
  body: string;
  dist: string;
  dist_min: string;
  dist_max: string;
  v_inf: string;
}

export const smallBodyRecord: SmallBodyRecord = JSON.parse(
  readFileSync(new URL('../checks/data/apophis.json', import.meta.url), 'utf8'),
);

/** A Julian date written in decimal, split without losing digits. */
function epochOfJd(text: string): Epoch {
  const [whole, fraction = '0'] = text.split('.');
  const half = Number(`0.${fraction}`) - 0.5;
  const mjd = Number(whole) - 2400000 + (half >= 0 ? 0 : -1);
  return { scale: 'TDB', mjd, secondOfDay: (half >= 0 ? half : half + 1) * SECONDS_PER_DAY };
}

/** TDB seconds past J2000 of a Julian date TDB written in decimal. */
export function secondsOfJd(text: string): number {
  const epoch = epochOfJd(text);
  return (epoch.mjd + 2400000.5 - JD_J2000) * SECONDS_PER_DAY + epoch.secondOfDay;
}

function published(label: string): string {
  const { elements, model_pars } = smallBodyRecord.orbit;
  const found =
    elements.find((item) => item.label === label) ?? model_pars.find((item) => item.name === label);
  if (found === undefined) throw new Error(`the record has no ${label}`);
  return found.value;
}

/** The published elements and A2 at their epoch, searched between two Julian dates TDB. */
export function publishedCase(fromJd: string, toJd: string): OrbitCase {
  return caseOf({
    epoch: epochOfJd(smallBodyRecord.orbit.epoch),
    axes: 'EclipticJ2000',
    state: {
      kind: 'elements',
      periapsisKm: Number(published('q')) * AU_KM,
      eccentricity: Number(published('e')),
      inclinationDeg: Number(published('i')),
      nodeDeg: Number(published('node')),
      argumentOfPeriapsisDeg: Number(published('peri')),
      phase: { kind: 'periapsis-time', periapsisEpoch: epochOfJd(published('tp')) },
    },
    nonGravitational: { a1AuD2: 0, a2AuD2: Number(published('A2')), a3AuD2: 0 },
    span: { fromTdbSeconds: secondsOfJd(fromJd), toTdbSeconds: secondsOfJd(toJd) },
  });
}
