import type { GmSet } from '../constants';
import type { Epoch, TimeScale } from '../time/epoch';
import type { ElementLabel } from '../uncertainty/covariance';

/** What a case is: everything one orbit solution says, in the centre, axes and scale it was given in. */

export type Centre = 'Sun' | 'SSB' | 'Earth' | 'EarthBarycentre' | 'Moon';

/** ICRF stands for ICRF, GCRF and EME2000 (the 0.02″ bias is neglected and said so in the report). */
export type Axes = 'ICRF' | 'EclipticJ2000';

export type Triple = [number, number, number];

export interface CartesianState {
  kind: 'cartesian';
  positionKm: Triple;
  velocityKmS: Triple;
}

/** Where on its orbit the object is at the epoch. */
export type OrbitPhase =
  | { kind: 'mean-anomaly'; meanAnomalyDeg: number }
  | { kind: 'true-anomaly'; trueAnomalyDeg: number }
  | { kind: 'periapsis-time'; periapsisEpoch: Epoch };

/** Osculating elements about the centre; size is given as periapsis distance for every conic. */
export interface ElementsState {
  kind: 'elements';
  periapsisKm: number;
  eccentricity: number;
  inclinationDeg: number;
  nodeDeg: number;
  argumentOfPeriapsisDeg: number;
  phase: OrbitPhase;
}

/** Transverse and other accelerations at 1 au, au/d^2, with g(r) = (1 au / r)^2. */
export interface NonGravitational {
  a1AuD2: number;
  a2AuD2: number;
  a3AuD2: number;
}

export interface Physical {
  absoluteMagnitude?: number;
  slopeParameter?: number;
  diameterM?: number;
  albedo?: number;
  densityKgM3?: number;
  strengthPa?: number;
}

/** Covariance of position and velocity: 21 lower-triangle entries by rows, km^2, km^2/s, km^2/s^2. */
export interface CartesianCovariance {
  kind: 'cartesian';
  frame: 'ICRF' | 'EclipticJ2000' | 'RTN' | 'TNW';
  lowerTriangle: number[];
}

/** Covariance of orbital elements, in the order of its labels: au, days, degrees, au/d². */
export interface ElementCovariance {
  kind: 'elements';
  labels: ElementLabel[];
  matrix: number[][];
}

export interface OrbitCase {
  name: string;
  objectId: string | null;
  /** True for the demonstration cases: an invented object on an invented approach. */
  invented: boolean;
  originator: string | null;
  epoch: Epoch;
  centre: Centre;
  axes: Axes;
  state: CartesianState | ElementsState;
  covariance: CartesianCovariance | ElementCovariance | null;
  nonGravitational: NonGravitational | null;
  physical: Physical;
  model: { gm: GmSet };
  /** Span of the search, TDB seconds past J2000; null takes the default span about the epoch. */
  span: { fromTdbSeconds: number; toTdbSeconds: number } | null;
}

/** Names of the fields a person sees and may edit; also the keys of `Choices`. */
export const FIELD_NAMES = [
  'name',
  'objectId',
  'epoch',
  'timeScale',
  'centre',
  'axes',
  'lengthUnit',
  'speedUnit',
  'x',
  'y',
  'z',
  'vx',
  'vy',
  'vz',
  'semiMajorAxis',
  'periapsisDistance',
  'eccentricity',
  'inclination',
  'node',
  'argumentOfPeriapsis',
  'meanAnomaly',
  'trueAnomaly',
  'periapsisTime',
  'covariance',
  'a1',
  'a2',
  'a3',
  'absoluteMagnitude',
  'slopeParameter',
  'diameter',
  'albedo',
  'density',
  'strength',
  'gm',
  'spanFrom',
  'spanTo',
  /** How numbers are written, where a text can be read in two ways (decimal comma or point). */
  'numberFormat',
] as const;

export type FieldName = (typeof FIELD_NAMES)[number];

/** What the person has set by hand, as text, over what the text says or what is assumed. */
export type Choices = Partial<Record<FieldName, string>>;

export type FieldOrigin = 'read' | 'assumed' | 'edited';

/** One line of the case as understood. */
export interface Field {
  field: FieldName;
  /** What a person calls it: "x, towards the equinox". */
  label: string;
  /** The value as text in `unit`, editable: choosing another sets `Choices[field]`. */
  value: string;
  unit: string | null;
  origin: FieldOrigin;
  /** 1-based line of the pasted text it was read from; null when assumed or edited. */
  line: number | null;
  /** Closed choice, when there is one: the texts that `value` may take, with their labels. */
  options: { value: string; label: string }[] | null;
  /** Why it was assumed, or what was made of what was read ("EME2000 taken as ICRF"). */
  note: string | null;
}

/** What the desk keeps beside the case: goes into a case file. */
export interface DeskContent {
  text: string;
  choices: Choices;
  clockTdbSeconds: number | null;
  plateFindings: string[];
}

/** Something wrong or worth knowing, beside its line. */
export interface Problem {
  severity: 'error' | 'warning' | 'note';
  line: number | null;
  field: string;
  read: string;
  expected: string;
  /** The whole sentence, with what to do. */
  message: string;
}

/** Two readings are possible: both are said, and the person is asked. */
export interface Question {
  field: FieldName;
  line: number | null;
  message: string;
  readings: { value: string; label: string }[];
}

export type CaseFormat = 'opm-kvn' | 'opm-xml' | 'free-text' | 'elements-text' | 'case-file';

/** What reading a text gives. `case` is null while an error or a question stands. */
export interface ReadResult {
  format: CaseFormat | null;
  fields: Field[];
  problems: Problem[];
  questions: Question[];
  case: OrbitCase | null;
}

export type { Epoch, GmSet, TimeScale };
