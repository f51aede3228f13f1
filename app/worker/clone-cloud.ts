import { CLONE_POINT } from '../../core/uncertainty/clones';

/** Points that are drawn; the counts are of all clones. */
const MOST_POINTS = 20_000;

/** The clones of the principal approach as they stream in. Mutable: watch `version`. */
export class CloneCloud {
  private readonly plain = new Float32Array(MOST_POINTS * CLONE_POINT.size);
  private readonly rare = new Float32Array(MOST_POINTS * CLONE_POINT.size);
  private plainEnd = 0;
  private rareEnd = 0;
  /** Grows with every change. */
  version = 0;

  /** Takes new points; those beyond the most that are drawn are left out. */
  append(drawn: 'plain' | 'rare', points: Float32Array): void {
    const into = drawn === 'plain' ? this.plain : this.rare;
    const from = drawn === 'plain' ? this.plainEnd : this.rareEnd;
    const taken = points.subarray(0, into.length - from);
    into.set(taken, from);
    if (drawn === 'plain') this.plainEnd += taken.length;
    else this.rareEnd += taken.length;
    this.version += 1;
  }

  /** The plain clones alone, in a new cloud. */
  withoutRare(): CloneCloud {
    const cloud = new CloneCloud();
    cloud.append('plain', this.points('plain'));
    return cloud;
  }

  /** Points so far, CLONE_POINT.size numbers each; a view, not a copy. */
  points(drawn: 'plain' | 'rare'): Float32Array {
    return drawn === 'plain'
      ? this.plain.subarray(0, this.plainEnd)
      : this.rare.subarray(0, this.rareEnd);
  }
}
