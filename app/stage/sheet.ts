import type { Report } from '../../core/report/report';
import type { NamedDistances } from '../store/store';
import type { Spread } from '../worker/spread';
import type { Trajectory } from '../worker/trajectory';
import type { Encounter } from './encounter';
import type { Inks } from './inks';
import type { Box, Label } from './labels';
import type { Pen } from './pen';
import type { Projector } from './projection';
import type { StampBuffer } from './stamp-buffer';

/** What a scene is drawn on: the pen for lines, stamps for marks, and the lettering to come. */
export interface Sheet {
  readonly pen: Pen;
  readonly projector: Projector;
  readonly stamps: StampBuffer;
  readonly inks: Inks;
  /** The moment that is drawn, TDB seconds past J2000. */
  readonly tdbSeconds: number;
  /** Device pixels per px. */
  readonly pixelRatio: number;
  readonly labels: Label[];
  /** Boxes that the lettering keeps clear of. */
  readonly taken: Box[];
}

/** What a scene shows: the streamed states at one moment and what is known of the case. */
export interface Moment {
  /** Two samples at least. */
  readonly trajectory: Trajectory;
  readonly sample: Float64Array;
  /** Of this trajectory. */
  readonly report: Report | null;
  readonly encounter: Encounter;
  readonly namedDistances: NamedDistances;
  readonly showUnperturbed: boolean;
  /** Of the report; null where there is none, or it is not to be shown. */
  readonly spread: Spread | null;
}
