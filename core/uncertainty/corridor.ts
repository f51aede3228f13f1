/** The strip of ground that impacting clones would meet: plain data, angles in radians. */

/** Least, middle and largest: 5, 50 and 95 % of the probability. */
export type Spread = readonly [number, number, number];

/** A piece of the ground between two parallels and two meridians; none lies across ±180°. */
export interface CorridorCell {
  southRad: number;
  northRad: number;
  westRad: number;
  eastRad: number;
  /** That it strikes here: its share of the probability of impact. */
  probability: number;
  areaKm2: number;
  /** Share of the whole probability in the cells that are at least as dense, (0, 1]. */
  within: number;
}

/** A place on the ridge of the corridor, with what the clones about it have in common. */
export interface AxisPoint {
  latitudeRad: number;
  longitudeRad: number;
  /** Mean time at the entry interface, TDB seconds past J2000. */
  entryTdbSeconds: number;
  /** Across the axis, 1 σ; zero from a single clone. */
  halfWidthKm: number;
  entryAirSpeedKmS: Spread;
  /** Against the air; negative below the horizontal. */
  entryAngleRad: Spread;
}

/** One connected strip, its axis in the order of entry time from one end to the other. */
export interface CorridorPiece {
  probability: number;
  /** Along the axis. */
  lengthKm: number;
  axis: AxisPoint[];
}

export interface Corridor {
  /** That it enters the air here: the sum of the weights. */
  probability: number;
  /** Part of it that grazes the air and does not reach the ground in flight without air. */
  grazingProbability: number;
  rows: number;
  /** Kish's effective sample size. */
  effectiveRows: number;
  /** Height of the cells, and standard deviation of the kernel that spreads the clones over them. */
  cellKm: number;
  kernelKm: number;
  /** Densest first. */
  cells: CorridorCell[];
  /** Likeliest first. */
  pieces: CorridorPiece[];
  firstEntryTdbSeconds: number;
  medianEntryTdbSeconds: number;
  lastEntryTdbSeconds: number;
  entryAirSpeedKmS: Spread;
  entryAngleRad: Spread;
}
