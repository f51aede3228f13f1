import { BODY_INDEX, BODY_RADIUS_KM, ENTRY_INTERFACE_ALTITUDE_KM } from '../constants';
import type { CloneField } from '../dynamics/clone-field';
import type { CloneStep } from '../dynamics/clone-step';
import { DENSE_DOUBLES, evaluateDense } from '../dynamics/dop853';
import { geodeticFromItrf } from '../frames/geodetic';

/** An approach of a clone: states are relative to the body, ICRF, km and km/s. */
export interface CloneApproach {
  clone: number;
  /** Index of the body, as BODY_INDEX. */
  body: number;
  /** Closest approach; null where the clone ends on the surface before it. */
  closest: Moment | null;
  /** At the geodetic altitude of 100 km, inbound (the Earth only). */
  entry: Moment | null;
  /** On the surface, where the clone ends. */
  surface: Moment | null;
}

export interface Moment {
  tdbSeconds: number;
  state: Float64Array;
}

interface WatchedBody {
  index: number;
  /** Minima farther than this are passed over, km. */
  limitKm: number;
  radiusKm: number;
}

const EARTH = BODY_INDEX.Earth;
const MOST_HALVINGS = 60;
/** Nearer than this to its centre the Earth's air is looked for, km. */
const AIR_KM = BODY_RADIUS_KM.Earth + ENTRY_INTERFACE_ALTITUDE_KM + 1;

/**
 * Watches a batch of clones for approaches to the Earth and the Moon, entry and impact.
 *
 * Each step of each clone is tested for a minimum of the distance (the relative velocity turns from
 * towards to away) and for the surface; only where there is one is the dense output of the step made.
 * Accuracy: that of the dense output; measured against single integrations in tests/checks.
 */
export class ApproachWatch {
  private readonly dense = new Float64Array(DENSE_DOUBLES);
  private readonly start = new Float64Array(6);
  private readonly state = new Float64Array(6);
  private readonly body = new Float64Array(6);
  private readonly origin = new Float64Array(6);
  private readonly relative = new Float64Array(6);
  private readonly entries = new Map<number, Moment>();
  private readonly watched: WatchedBody[];
  private base = 0;
  private offset = 0;
  private nearby: WatchedBody[] = [];

  constructor(
    private readonly field: CloneField,
    limitsKm: { earth: number; moon: number },
    private readonly found: (approach: CloneApproach) => void,
  ) {
    this.watched = [
      { index: EARTH, limitKm: limitsKm.earth, radiusKm: BODY_RADIUS_KM.Earth },
      { index: BODY_INDEX.Moon, limitKm: limitsKm.moon, radiusKm: BODY_RADIUS_KM.Moon },
    ];
  }

  beginStep(base: number, offset: number): void {
    this.base = base;
    this.offset = offset;
    this.nearby = this.watched.filter(({ index, limitKm }) =>
      this.field.group.mayComeWithin(index, limitKm, this.field.length),
    );
  }

  /** @returns true when the clone ends on a surface in this step */
  see(clone: number, step: CloneStep, lane: number): boolean {
    const { bodiesAtEnd } = this.field;
    const bodiesAtStart = this.field.group.bodies;
    for (const target of this.nearby) {
      const at = target.index * 6;
      const before = towards(step.from, lane * 6, bodiesAtStart, at);
      const after = towards(step.to, lane * 6, bodiesAtEnd, at);
      const end2 = distance2(step.to, lane * 6, bodiesAtEnd, at);
      const low = target.index === EARTH ? AIR_KM : target.radiusKm;
      const turned = before < 0 && after >= 0;
      if (!turned && end2 > low * low) continue;
      step.dense(lane, this.dense, this.start);
      if (this.look(clone, target, turned)) return true;
    }
    return false;
  }

  /** Follows the step through: entry, surface, minimum. */
  private look(clone: number, target: WatchedBody, turned: boolean): boolean {
    const lowest = turned ? this.root(target, 0, 1, (r) => radial(r)) : 1;
    const isEarth = target.index === EARTH;
    const altitude = isEarth ? this.altitude : (r: Float64Array) => norm(r) - target.radiusKm;
    this.at(target, lowest);
    const height = altitude(this.relative);
    if (isEarth && height < ENTRY_INTERFACE_ALTITUDE_KM && !this.entries.has(clone)) {
      this.at(target, 0);
      if (altitude(this.relative) > ENTRY_INTERFACE_ALTITUDE_KM) {
        const u = this.root(target, 0, lowest, (r) => ENTRY_INTERFACE_ALTITUDE_KM - altitude(r));
        this.entries.set(clone, this.moment(target, u));
      }
    }
    if (height < 0) {
      const u = this.root(target, 0, lowest, (r) => -altitude(r));
      const surface = this.moment(target, u);
      this.report(clone, target, null, surface);
      return true;
    }
    if (turned) {
      const closest = this.moment(target, lowest);
      if (norm(closest.state) <= target.limitKm) this.report(clone, target, closest, null);
    }
    return false;
  }

  private report(
    clone: number,
    { index }: WatchedBody,
    closest: Moment | null,
    surface: Moment | null,
  ): void {
    const entry = index === EARTH ? (this.entries.get(clone) ?? null) : null;
    if (index === EARTH) this.entries.delete(clone);
    this.found({ clone, body: index, closest, entry, surface });
  }

  private moment(target: WatchedBody, u: number): Moment {
    this.at(target, u);
    return {
      tdbSeconds: this.base + (this.offset + u * this.field.length),
      state: Float64Array.from(this.relative),
    };
  }

  /** State relative to the body at a place in the step, in `relative`. */
  private at({ index }: WatchedBody, u: number): void {
    const { state, body, origin, relative } = this;
    evaluateDense(this.dense, this.start, u, state);
    this.field.bodyState(index, u, body);
    this.field.origin(u, origin);
    for (let k = 0; k < 6; k++) relative[k] = origin[k] - body[k] + state[k];
  }

  /** Geodetic altitude over an ellipsoid about the pole of date, km. */
  private readonly altitude = (r: Float64Array): number => {
    const { pole } = this.field;
    const z = r[0] * pole[0] + r[1] * pole[1] + r[2] * pole[2];
    const p = Math.sqrt(Math.max(0, r[0] * r[0] + r[1] * r[1] + r[2] * r[2] - z * z));
    return geodeticFromItrf([p, 0, z]).altitudeKm;
  };

  /** Where a function of the relative state, not above zero at `from`, rises through zero (Illinois method). */
  private root(
    target: WatchedBody,
    from: number,
    to: number,
    value: (relative: Float64Array) => number,
  ): number {
    const at = (u: number): number => {
      this.at(target, u);
      return value(this.relative);
    };
    let a = from;
    let b = to;
    let fa = at(a);
    let fb = at(b);
    if (fa >= 0) return a;
    if (fb <= 0) return b;
    for (let i = 0; i < MOST_HALVINGS; i++) {
      const u = b - (fb * (b - a)) / (fb - fa);
      if (Math.abs(u - b) * this.field.length < 1e-5 || fb === fa) return u;
      const f = at(u);
      if (f * fb < 0) {
        a = b;
        fa = fb;
      } else fa *= 0.5;
      b = u;
      fb = f;
      if (f === 0) return u;
    }
    return b;
  }
}

const norm = (r: Float64Array): number => Math.sqrt(r[0] * r[0] + r[1] * r[1] + r[2] * r[2]);
const radial = (r: Float64Array): number => r[0] * r[3] + r[1] * r[4] + r[2] * r[5];

/** r · v relative to a body. */
function towards(state: Float64Array, from: number, bodies: Float64Array, at: number): number {
  return (
    (state[from] - bodies[at]) * (state[from + 3] - bodies[at + 3]) +
    (state[from + 1] - bodies[at + 1]) * (state[from + 4] - bodies[at + 4]) +
    (state[from + 2] - bodies[at + 2]) * (state[from + 5] - bodies[at + 5])
  );
}

function distance2(state: Float64Array, from: number, bodies: Float64Array, at: number): number {
  const x = state[from] - bodies[at];
  const y = state[from + 1] - bodies[at + 1];
  const z = state[from + 2] - bodies[at + 2];
  return x * x + y * y + z * z;
}
