import { SECONDS_PER_DAY } from '../constants';
import type { Segment } from '../dynamics/propagate';
import type { Ephemeris } from '../ephemeris';
import { celestialToTerrestrial, earthOrientation } from '../frames/earth-orientation';
import { geodeticAltitudeKm } from '../frames/geodetic';
import { findMinimum, findRoot } from '../math/roots';
import { rotate, vec3 } from '../math/vector';
import { type BoundaryName, TARGETS, type Target, type TargetBody } from './targets';

/** A local minimum of the distance to a body, or the passing of a boundary about it. */
export interface EncounterEvent {
  kind: 'minimum' | 'crossing';
  body: TargetBody;
  /** Set for a crossing. */
  boundary: BoundaryName | null;
  direction: 'in' | 'out' | null;
  tdbSeconds: number;
  /** State relative to the body, km and km/s, ICRF (6). */
  relative: Float64Array;
  /** Barycentric states of all bodies at the instant (11 × 6). */
  bodies: Float64Array;
  /** Barycentric state of the object (6). */
  object: Float64Array;
  distanceKm: number;
}

/** Widest spacing of samples while the Moon is within its limit: a lunar minimum needs ≤ 0.7 d. */
const MOON_SPACING_S = 0.5 * SECONDS_PER_DAY;
/** Tolerance of event times, s: 1e-6 s is 0.07 m at 70 km/s. */
const TIME_TOLERANCE_S = 1e-6;
/** Below this geocentric distance altitudes over the ellipsoid are looked at, km. */
const ALTITUDE_REGION_KM = 7000;
/** More than the difference of the Earth's equatorial and polar radius, km. */
const FLATTENING_RANGE_KM = 25;

/**
 * Finds every minimum and every boundary crossing within one integration step after another.
 *
 * Each step is sampled inside; a sign change of r·v between samples brackets an extremum, and
 * intervals where r·v comes near zero without changing sign are sampled again more finely, so that
 * two extrema inside one interval are not lost. Extrema split the step into stretches on which the
 * distance is monotonic, so a sphere can be crossed at most once on each. All brackets are refined
 * on a fresh integration step from the segment's start, not on the dense output.
 */
export class EncounterScanner {
  private readonly object = new Float64Array(6);
  private readonly bodies = new Float64Array(66);
  private segment: Segment | null = null;

  constructor(private readonly ephemeris: Ephemeris) {}

  /**
   * Events of one segment, in order of time.
   *
   * @param segment an accepted step, forward or backward
   * @returns events with their instants within 1e-6 s of the roots of the integrated motion
   */
  scan(segment: Segment): EncounterEvent[] {
    this.segment = segment;
    const from = Math.min(segment.startOffset, segment.endOffset);
    const to = Math.max(segment.startOffset, segment.endOffset);
    const events: EncounterEvent[] = [];
    const ends = [this.sampleAll(from), this.sampleAll(to)];
    for (const [k, target] of TARGETS.entries()) {
      const a = ends[0][k];
      const b = ends[1][k];
      const reach = Math.max(a.speed, b.speed) * (to - from);
      const nearest = Math.max(0, 0.5 * (a.distance + b.distance - reach));
      if (nearest > target.limitKm) continue;
      let count = nearest < 0.5 * Math.min(a.distance, b.distance) ? 16 : 4;
      if (target.body === 'Moon') count = Math.max(count, Math.ceil((to - from) / MOON_SPACING_S));
      const nodes = this.extrema(target, this.nodes(target, from, to, count), events);
      this.crossings(target, nodes, events);
    }
    return events.sort((x, y) => x.tdbSeconds - y.tdbSeconds);
  }

  private sampleAll(offset: number): { distance: number; speed: number }[] {
    this.evaluate(offset, false);
    return TARGETS.map((target) => {
      const node = this.node(target, offset);
      return { distance: node.distance, speed: node.speed };
    });
  }

  private evaluate(offset: number, exact: boolean): void {
    const segment = this.segment as Segment;
    if (exact) segment.exactState(offset, this.object);
    else segment.evaluate(offset, this.object);
    this.ephemeris.states(segment.baseSeconds, offset, this.bodies);
  }

  /** What the last evaluation says about a body. */
  private node(target: Target, offset: number): Node {
    const o = this.object;
    const b = this.bodies;
    const at = target.index * 6;
    const x = o[0] - b[at];
    const y = o[1] - b[at + 1];
    const z = o[2] - b[at + 2];
    const vx = o[3] - b[at + 3];
    const vy = o[4] - b[at + 4];
    const vz = o[5] - b[at + 5];
    return {
      offset,
      distance: Math.sqrt(x * x + y * y + z * z),
      speed: Math.sqrt(vx * vx + vy * vy + vz * vz),
      radial: x * vx + y * vy + z * vz,
    };
  }

  private nodeAt(target: Target, offset: number, exact: boolean): Node {
    this.evaluate(offset, exact);
    return this.node(target, offset);
  }

  private nodes(target: Target, from: number, to: number, count: number): Node[] {
    const nodes: Node[] = [];
    for (let i = 0; i <= count; i++) {
      nodes.push(this.nodeAt(target, i === count ? to : from + ((to - from) * i) / count, false));
    }
    return nodes;
  }

  /** Adds the minima to `events`; returns the nodes with all extrema put in. */
  private extrema(target: Target, coarse: Node[], events: EncounterEvent[]): Node[] {
    const nodes: Node[] = [coarse[0]];
    const pair = (a: Node, b: Node): void => {
      if (a.radial < 0 !== b.radial < 0) {
        const radial = (offset: number): number => this.nodeAt(target, offset, true).radial;
        const offset = refine(radial, a.offset, b.offset);
        if (offset !== null) {
          const node = this.nodeAt(target, offset, true);
          nodes.push(node);
          if (a.radial < 0 && node.distance <= target.limitKm) {
            events.push(this.event('minimum', target, offset, null, null));
          }
        }
      }
      nodes.push(b);
    };
    for (let i = 1; i < coarse.length; i++) {
      const a = coarse[i - 1];
      const b = coarse[i];
      const nearZero =
        Math.min(Math.abs(a.radial), Math.abs(b.radial)) <
        0.5 * Math.max(a.speed, b.speed) ** 2 * (b.offset - a.offset);
      if (a.radial < 0 === b.radial < 0 && nearZero) {
        const fine = this.nodes(target, a.offset, b.offset, 6);
        fine[0] = a;
        fine[6] = b;
        for (let j = 1; j < fine.length; j++) pair(fine[j - 1], fine[j]);
      } else {
        pair(a, b);
      }
    }
    return nodes;
  }

  private crossings(target: Target, nodes: Node[], events: EncounterEvent[]): void {
    for (const { name, radiusKm } of target.spheres) {
      const distance = (offset: number): number =>
        this.nodeAt(target, offset, true).distance - radiusKm;
      for (let i = 1; i < nodes.length; i++) {
        const a = nodes[i - 1].distance - radiusKm;
        const b = nodes[i].distance - radiusKm;
        if (a < 0 === b < 0) continue;
        const offset = refine(distance, nodes[i - 1].offset, nodes[i].offset);
        if (offset !== null) {
          events.push(this.event('crossing', target, offset, name, a >= 0 ? 'in' : 'out'));
        }
      }
    }
    if (target.altitudes.length === 0) return;
    if (!nodes.some((node) => node.distance < ALTITUDE_REGION_KM)) return;
    for (const { name, altitudeKm } of target.altitudes) {
      this.altitudeCrossings(target, nodes, name, altitudeKm, events);
    }
  }

  /** Altitude over the ellipsoid less a level, km. */
  private altitudeAbove(level: number, offset: number, exact: boolean): number {
    this.evaluate(offset, exact);
    const at = TARGETS[0].index * 6;
    const o = this.object;
    const b = this.bodies;
    const segment = this.segment as Segment;
    const axes = celestialToTerrestrial(earthOrientation(segment.baseSeconds + offset));
    const place = rotate(axes, [o[0] - b[at], o[1] - b[at + 1], o[2] - b[at + 2]]);
    return geodeticAltitudeKm(place) - level;
  }

  private altitudeCrossings(
    target: Target,
    nodes: Node[],
    name: BoundaryName,
    level: number,
    events: EncounterEvent[],
  ): void {
    const above = (offset: number): number => this.altitudeAbove(level, offset, true);
    const marks: { offset: number; value: number }[] = [];
    for (const [i, node] of nodes.entries()) {
      const far = node.distance > ALTITUDE_REGION_KM;
      const value = far ? node.distance - 6300 : above(node.offset);
      marks.push({ offset: node.offset, value });
      // The lowest altitude is not quite where the distance is least: a dip between nodes.
      const before = nodes[i - 1];
      const after = nodes[i + 1];
      if (far || before === undefined || after === undefined) continue;
      const lowest = node.distance <= before.distance && node.distance <= after.distance;
      if (!lowest || value < 0 || value > FLATTENING_RANGE_KM) continue;
      const dip = findMinimum(above, before.offset, after.offset, 1e-3);
      if (dip.value < 0) marks.push({ offset: dip.x, value: dip.value });
    }
    marks.sort((a, b) => a.offset - b.offset);
    for (let i = 1; i < marks.length; i++) {
      const a = marks[i - 1];
      const b = marks[i];
      if (a.value < 0 === b.value < 0) continue;
      const offset = refine(above, a.offset, b.offset);
      if (offset !== null) {
        events.push(this.event('crossing', target, offset, name, a.value >= 0 ? 'in' : 'out'));
      }
    }
  }

  private event(
    kind: 'minimum' | 'crossing',
    target: Target,
    offset: number,
    boundary: BoundaryName | null,
    direction: 'in' | 'out' | null,
  ): EncounterEvent {
    this.evaluate(offset, true);
    const at = target.index * 6;
    const relative = this.object.map((value, i) => value - this.bodies[at + i]);
    return {
      kind,
      body: target.body,
      boundary,
      direction,
      tdbSeconds: (this.segment as Segment).baseSeconds + offset,
      relative,
      bodies: this.bodies.slice(),
      object: this.object.slice(),
      distanceKm: Math.hypot(...vec3(relative)),
    };
  }
}

interface Node {
  /** Seconds past the segment's base. */
  offset: number;
  distance: number;
  speed: number;
  /** r·v, km^2/s. */
  radial: number;
}

/**
 * The bracket came from the dense output, the function is the fresh step's: at a bracket's end they
 * may differ in sign by rounding, and then that end is the root.
 */
function refine(f: (x: number) => number, a: number, b: number): number | null {
  const fa = f(a);
  const fb = f(b);
  if (!Number.isFinite(fa) || !Number.isFinite(fb)) return null;
  if (fa < 0 === fb < 0) return Math.abs(fa) < Math.abs(fb) ? a : b;
  return findRoot(f, a, b, TIME_TOLERANCE_S);
}
