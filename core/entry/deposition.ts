/** Where in the air the energy goes: sums over slabs of altitude. */

/**
 * Energy, and power, given to the air in slabs of equal thickness from the ground up.
 *
 * Allocates nothing after its making; `clear` serves the next flight.
 */
export class Deposition {
  /** MJ per slab. */
  readonly energyMJ: Float64Array;
  /** Energy times the speed of descent there: divided by the thickness, MJ/s. */
  readonly energySpeed: Float64Array;

  /**
   * @param slabKm thickness of a slab, km
   * @param topKm  what falls above it counts to the highest slab; what falls below 0 to the lowest
   */
  constructor(
    readonly slabKm: number,
    topKm: number,
  ) {
    const slabs = Math.ceil(topKm / slabKm);
    this.energyMJ = new Float64Array(slabs);
    this.energySpeed = new Float64Array(slabs);
  }

  clear(): void {
    this.energyMJ.fill(0);
    this.energySpeed.fill(0);
  }

  /** Adds energy at one altitude. */
  addAt(altitudeKm: number, energyMJ: number): void {
    this.energyMJ[this.slabOf(altitudeKm)] += energyMJ;
  }

  /**
   * Adds a step of a flight: altitude and energy between its ends are cubics of their values and
   * rates.
   *
   * @param seconds  length of the step
   * @param h0, h1   altitude at its ends, km; hRate0, hRate1 its rate there, km/s
   * @param e0, e1   energy given to the air since the start, at its ends; eRate0, eRate1 its rate
   * @param weightMJ MJ for each unit of that energy
   */
  addStep(
    seconds: number,
    h0: number,
    hRate0: number,
    h1: number,
    hRate1: number,
    e0: number,
    eRate0: number,
    e1: number,
    eRate1: number,
    weightMJ: number,
  ): void {
    if (e1 === e0) return;
    const path = Math.max(Math.abs(h1 - h0), 0.5 * seconds * Math.abs(hRate1 - hRate0));
    const parts = Math.min(1000, Math.ceil(path / this.slabKm) + 1);
    let low = h0;
    let spent = e0;
    for (let i = 1; i <= parts; i++) {
      const u = i / parts;
      const w = 1 - u;
      const a = (1 + 2 * u) * w * w;
      const b = u * w * w * seconds;
      const c = u * u * (3 - 2 * u);
      const d = -u * u * w * seconds;
      const high = a * h0 + b * hRate0 + c * h1 + d * hRate1;
      const energy = a * e0 + b * eRate0 + c * e1 + d * eRate1;
      const speed = Math.abs(high - low) * (parts / seconds);
      this.spread(low, high, (energy - spent) * weightMJ, speed);
      low = high;
      spent = energy;
    }
  }

  /** Altitude of the slab, or slabs, with most of a quantity: vertex of the parabola through three. */
  peakAltitudeKm(of: Float64Array): number {
    let best = 0;
    for (let i = 1; i < of.length; i++) if (of[i] > of[best]) best = i;
    const middle = (best + 0.5) * this.slabKm;
    if (best === 0 || best === of.length - 1) return middle;
    const left = of[best - 1];
    const right = of[best + 1];
    const curve = left - 2 * of[best] + right;
    return curve === 0 ? middle : middle + (0.5 * this.slabKm * (left - right)) / curve;
  }

  /** Sum over all slabs, MJ. */
  totalMJ(): number {
    let sum = 0;
    for (let i = 0; i < this.energyMJ.length; i++) sum += this.energyMJ[i];
    return sum;
  }

  private slabOf(altitudeKm: number): number {
    const slab = Math.floor(altitudeKm / this.slabKm);
    return Math.min(this.energyMJ.length - 1, Math.max(0, slab));
  }

  /** Shares an energy evenly over the altitudes between two. */
  private spread(from: number, to: number, energyMJ: number, speed: number): void {
    const low = Math.min(from, to);
    const high = Math.max(from, to);
    const first = this.slabOf(low);
    const last = this.slabOf(high);
    if (first === last) {
      this.energyMJ[first] += energyMJ;
      this.energySpeed[first] += energyMJ * speed;
      return;
    }
    const perKm = energyMJ / (high - low);
    for (let slab = first; slab <= last; slab++) {
      const bottom = slab === first ? low : slab * this.slabKm;
      const top = slab === last ? high : (slab + 1) * this.slabKm;
      const share = perKm * (top - bottom);
      this.energyMJ[slab] += share;
      this.energySpeed[slab] += share * speed;
    }
  }
}
