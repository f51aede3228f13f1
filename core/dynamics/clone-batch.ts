import type { CloneField } from './clone-field';
import { CloneStep, LANES } from './clone-step';

/** What looks at every step of every clone. */
export interface CloneWatch {
  /** Called when a new step of the field begins, before its clones. */
  beginStep(base: number, offset: number): void;
  /**
   * Called for each clone with its step made, in a lane of `step`.
   *
   * @returns true when the clone ends here
   */
  see(clone: number, step: CloneStep, lane: number): boolean;
}

/** The base of time is moved when the offset grows beyond this, s: its rounding stays below 2.4e-10 s. */
const LARGEST_OFFSET_S = 2 ** 20;
/** A shorter step for all is taken where it is at most this much shorter than the longest wanted. */
const ALIKE = 0.6;
/** Never shorter, s. */
const SHORTEST_STEP_S = 1e-3;
/** Groups within groups; deeper than any case needs. */
const MOST_DEPTH = 24;

/**
 * Carries a batch of clones in step.
 *
 * The clones share the time grid and the field of each step (`CloneField`). Where they need steps of
 * very different length (some at a planet, some far from it), the majority makes its long step, and
 * the others cover the same time as a group of their own with shorter ones, and so on. The result
 * depends on the batch alone.
 *
 * @param states     barycentric states at the start, km and km/s (6 each); end states on return
 * @param deviations of A1 to A3 of each clone, km/s² (3 each); null for none
 * Accuracy: measured against single integrations in tests/checks.
 */
export function carryBatch(
  field: CloneField,
  states: Float64Array,
  deviations: Float64Array | null,
  fromTdbSeconds: number,
  toTdbSeconds: number,
  watch: CloneWatch,
): void {
  const step = new CloneStep(field);
  step.hasDeviations = deviations !== null;
  const total = states.length / 6;
  const ended = new Uint8Array(total);
  const wishes = new Float64Array(total);
  const groups = Array.from({ length: MOST_DEPTH + 1 }, () => new Int32Array(total));
  /** Which clone goes in each lane. */
  const clones = new Int32Array(LANES);
  let base = 0;

  function makeStep(lanes: number): void {
    step.make(lanes);
    for (let lane = 0; lane < lanes; lane++) {
      const clone = clones[lane];
      if (watch.see(clone, step, lane)) ended[clone] = 1;
      for (let k = 0; k < 6; k++) states[clone * 6 + k] = step.to[lane * 6 + k];
    }
  }

  /** Carries the first `count` clones of a group from one offset to another. */
  function carry(depth: number, count: number, from: number, until: number): void {
    const group = groups[depth];
    let members = count;
    let offset = from;
    let to = until;
    while (members > 0 && offset < to) {
      const left = to - offset;
      field.group.survey(states, group, members, base, offset, toTdbSeconds - base - offset);
      field.group.nearSteps(states, group, members, Math.min(left, field.group.farStep()), wishes);
      const deepest = depth === MOST_DEPTH;
      let length = Math.max(
        SHORTEST_STEP_S,
        deepest ? least(wishes, members) : shared(wishes, members),
      );
      // No sliver at the end.
      if (length >= left) length = left;
      else if (length > 0.5 * left) length = 0.5 * left;
      field.prepare(length);
      step.begin();
      watch.beginStep(base, offset);
      const others = groups[depth + 1];
      let otherCount = 0;
      let lanes = 0;
      for (let g = 0; g < members; g++) {
        const clone = group[g];
        if (wishes[g] < length && !deepest && length > SHORTEST_STEP_S) {
          others[otherCount++] = clone;
          continue;
        }
        clones[lanes] = clone;
        for (let k = 0; k < 6; k++) step.from[lanes * 6 + k] = states[clone * 6 + k];
        if (deviations !== null) {
          for (let k = 0; k < 3; k++) step.deviations[lanes * 3 + k] = deviations[clone * 3 + k];
        }
        lanes += 1;
        if (lanes === LANES) {
          makeStep(lanes);
          lanes = 0;
        }
      }
      makeStep(lanes);
      if (otherCount > 0) carry(depth + 1, otherCount, offset, offset + length);
      offset = length === left ? to : offset + length;
      let kept = 0;
      for (let g = 0; g < members; g++) {
        if (ended[group[g]] === 0) group[kept++] = group[g];
      }
      members = kept;
      if (depth === 0 && offset > LARGEST_OFFSET_S) {
        const whole = Math.floor(offset);
        base += whole;
        offset -= whole;
        to -= whole;
      }
    }
  }

  for (let i = 0; i < total; i++) groups[0][i] = i;
  base = Math.floor(fromTdbSeconds);
  carry(0, total, fromTdbSeconds - base, toTdbSeconds - base);
}

function least(wishes: Float64Array, count: number): number {
  let out = Number.POSITIVE_INFINITY;
  for (let i = 0; i < count; i++) if (wishes[i] < out) out = wishes[i];
  return out;
}

/** The step that the group makes: the least wish when all are alike, else one that half can make. */
function shared(wishes: Float64Array, count: number): number {
  let low = Number.POSITIVE_INFINITY;
  let high = 0;
  for (let i = 0; i < count; i++) {
    if (wishes[i] < low) low = wishes[i];
    if (wishes[i] > high) high = wishes[i];
  }
  if (low >= ALIKE * high) return low;
  for (let length = high; length > low; length *= 0.8) {
    let able = 0;
    for (let i = 0; i < count; i++) if (wishes[i] >= length) able += 1;
    if (able * 2 >= count) return length;
  }
  return low;
}
