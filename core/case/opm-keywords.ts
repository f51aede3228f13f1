import type { FieldName } from './types';

/** Keywords of a CCSDS Orbit Parameter Message (502.0-B-3, section 3.2), and what each is for us. */

/** One keyword with its value, however it was written. */
export interface Entry {
  key: string;
  value: string;
  unit: string | null;
  line: number;
}

export const TO_FIELD: Readonly<Record<string, FieldName>> = {
  OBJECT_NAME: 'name',
  OBJECT_ID: 'objectId',
  CENTER_NAME: 'centre',
  REF_FRAME: 'axes',
  TIME_SYSTEM: 'timeScale',
  EPOCH: 'epoch',
  X: 'x',
  Y: 'y',
  Z: 'z',
  X_DOT: 'vx',
  Y_DOT: 'vy',
  Z_DOT: 'vz',
};

export const KEPLERIAN: Readonly<Record<string, FieldName>> = {
  SEMI_MAJOR_AXIS: 'semiMajorAxis',
  ECCENTRICITY: 'eccentricity',
  INCLINATION: 'inclination',
  RA_OF_ASC_NODE: 'node',
  ARG_OF_PERICENTER: 'argumentOfPeriapsis',
  TRUE_ANOMALY: 'trueAnomaly',
  MEAN_ANOMALY: 'meanAnomaly',
};

export const USER_DEFINED: Readonly<Record<string, FieldName>> = {
  A1: 'a1',
  A2: 'a2',
  A3: 'a3',
  H: 'absoluteMagnitude',
  G: 'slopeParameter',
  DIAMETER_M: 'diameter',
  ALBEDO: 'albedo',
  DENSITY_KG_M3: 'density',
  STRENGTH_PA: 'strength',
};

export const AXIS = ['X', 'Y', 'Z', 'X_DOT', 'Y_DOT', 'Z_DOT'] as const;

export const MANDATORY: readonly string[] = [
  'CCSDS_OPM_VERS',
  'CREATION_DATE',
  'ORIGINATOR',
  'OBJECT_NAME',
  'OBJECT_ID',
  'CENTER_NAME',
  'REF_FRAME',
  'TIME_SYSTEM',
  'EPOCH',
  ...AXIS,
];
/** What is assumed in the open when it is missing; the rest is an error or only noted. */
export const ASSUMABLE: readonly string[] = ['CENTER_NAME', 'REF_FRAME', 'TIME_SYSTEM'];

export const SPACECRAFT: readonly string[] = [
  'MASS',
  'SOLAR_RAD_AREA',
  'SOLAR_RAD_COEFF',
  'DRAG_AREA',
  'DRAG_COEFF',
];
export const MANEUVER: readonly string[] = [
  'MAN_EPOCH_IGNITION',
  'MAN_DURATION',
  'MAN_DELTA_MASS',
  'MAN_REF_FRAME',
  'MAN_DV_1',
  'MAN_DV_2',
  'MAN_DV_3',
];

/** The 21 keywords of the covariance's lower triangle, by rows. */
export const COVARIANCE_KEYS: readonly string[] = AXIS.flatMap((row, i) =>
  AXIS.slice(0, i + 1).map((column) => `C${row}_${column}`),
);

const KNOWN = new Set<string>([
  ...MANDATORY,
  'MESSAGE_ID',
  'CLASSIFICATION',
  'REF_FRAME_EPOCH',
  ...Object.keys(KEPLERIAN),
  'GM',
  ...SPACECRAFT,
  'COV_REF_FRAME',
  ...COVARIANCE_KEYS,
  ...MANEUVER,
]);

export const isKeyword = (key: string): boolean => KNOWN.has(key);

const KEPLERIAN_UNIT: Readonly<Record<string, string | null>> = {
  SEMI_MAJOR_AXIS: 'km',
  ECCENTRICITY: null,
  GM: 'km**3/s**2',
};

/** The unit that the standard fixes for a keyword; null where it fixes none. */
export function unitOf(key: string): string | null {
  const covariance = COVARIANCE_KEYS.indexOf(key);
  if (covariance >= 0) {
    const rates = (key.match(/_DOT/g) ?? []).length;
    return rates === 0 ? 'km**2' : rates === 1 ? 'km**2/s' : 'km**2/s**2';
  }
  if ((AXIS as readonly string[]).includes(key)) return key.endsWith('_DOT') ? 'km/s' : 'km';
  if (key in KEPLERIAN_UNIT) return KEPLERIAN_UNIT[key];
  return key in KEPLERIAN ? 'deg' : null;
}

/** Whether two ways of writing a unit mean the same: powers as **2, ^2, ² or 2, in any case. */
export function isSameUnit(written: string, expected: string): boolean {
  const plain = (unit: string): string =>
    unit
      .toLowerCase()
      .replace(/\s|\*\*|\^/g, '')
      .replace('²', '2')
      .replace('³', '3')
      .replace('degrees', 'deg')
      .replace('°', 'deg');
  return plain(written) === plain(expected);
}
