import { ALL_STAGES, ROW_STAGES, ROW_WEIGHTS, STAGES, WEIGHTS } from './dop853-coefficients';

/**
 * Dormand–Prince 8(5,3) in Nyström form: for forces that do not depend on the velocity the places of
 * the stages follow from accelerations alone.
 *
 * With A the method's matrix and b its weights, the place of stage i is
 * x + c_i h v + h² Σ (A A)_ij f_j, and the place at the end x + h v + h² Σ (bᵀ A)_j f_j.
 * Source: Hairer, Nørsett & Wanner, Solving Ordinary Differential Equations I (1993), II.14.
 */

const matrix = (): number[][] => {
  const rows: number[][] = [];
  for (let i = 0; i < ALL_STAGES; i++) {
    const row = new Array<number>(ALL_STAGES).fill(0);
    for (const [j, stage] of ROW_STAGES[i].entries()) row[stage] = ROW_WEIGHTS[i][j];
    rows.push(row);
  }
  // The thirteenth stage is the end of the step.
  for (let j = 0; j < STAGES; j++) rows[STAGES][j] = WEIGHTS[j];
  return rows;
};

const A = matrix();

const squared = (row: number[]): number[] => {
  const out = new Array<number>(ALL_STAGES).fill(0);
  for (let k = 0; k < ALL_STAGES; k++) {
    if (row[k] === 0) continue;
    for (let j = 0; j < ALL_STAGES; j++) out[j] += row[k] * A[k][j];
  }
  return out;
};

/** Rows of weights without their zeros: row i takes entries STARTS[i] to STARTS[i + 1]. */
export interface SparseRows {
  starts: Uint8Array;
  stages: Uint8Array;
  weights: Float64Array;
}

function sparse(rows: number[][]): SparseRows {
  const starts = [0];
  const stages: number[] = [];
  const weights: number[] = [];
  for (const row of rows) {
    for (const [j, weight] of row.entries()) {
      if (weight === 0) continue;
      stages.push(j);
      weights.push(weight);
    }
    starts.push(stages.length);
  }
  return {
    starts: Uint8Array.from(starts),
    stages: Uint8Array.from(stages),
    weights: Float64Array.from(weights),
  };
}

/** Weights of h² f in the places of the 16 stages; stage 12 is the end of the step. */
export const PLACE_ROWS = sparse(A.map(squared));
/** Weights of h f in the velocities of the 16 stages; stage 12 is the end of the step. */
export const VELOCITY_ROWS = sparse(A);
