/**
 * The least of several linear objectives in turn, each on the best of those before. Knows nothing of plans.
 *
 * The simplex method on a dense tableau with the pivot rule of Bland 1977 (Math. Oper. Res. 2, 103–107), which
 * can't cycle. After each objective the columns with a positive reduced cost are shut out: by duality
 * these are zero wherever that objective is at its best, so no tolerance is handed to the next objective as
 * an extra constraint would do.
 */

/** Σ coefficient × variable ≤ atMost, with atMost ≥ 0, so that all variables at zero are allowed. */
export interface LinearRow {
  readonly coefficients: readonly number[];
  readonly atMost: number;
}

/** Variables are ≥ 0; well scaled when coefficients are near 1 or below. */
export interface LexicographicProblem {
  readonly variables: number;
  readonly rows: readonly LinearRow[];
  /** Coefficients of each objective, the weightiest objective first; each is minimised. */
  readonly objectives: readonly (readonly number[])[];
}

/**
 * Reduced costs nearer to zero than this count as equal. It is what keeps two sources of the same solution
 * from changing places when their strengths differ by a hair; what an objective can lose by it is this
 * fraction of the scale of its variables.
 */
const tie = 1e-5;
const smallestPivot = 1e-9;

/** The values of the variables. Always an allowed point; the best one unless the cap on pivots is reached. */
export function lexicographicMinimum(problem: LexicographicProblem): number[] {
  const { variables, rows, objectives } = problem;
  const columns = variables + rows.length;
  const tableau = rows.map((row, index) => {
    const line = new Float64Array(columns + 1);
    line.set(row.coefficients.slice(0, variables));
    line[variables + index] = 1;
    line[columns] = Math.max(0, row.atMost);
    return line;
  });
  const basis = rows.map((_, index) => variables + index);
  const shut = new Array<boolean>(columns).fill(false);
  let pivotsLeft = 100 * (columns + 1);

  for (const objective of objectives) {
    const cost = reducedCost(objective, tableau, basis, columns);
    while (pivotsLeft > 0) {
      const entering = firstImproving(cost, shut, columns);
      if (entering === -1) break;
      const leaving = tightestRow(tableau, basis, entering, columns);
      // Nothing bounds it: such an objective is no better served by going on for ever.
      if (leaving === -1) break;
      pivotsLeft -= 1;
      pivot(tableau, cost, leaving, entering, columns);
      basis[leaving] = entering;
    }
    for (let column = 0; column < columns; column += 1) if (cost[column]! > tie) shut[column] = true;
  }

  const values = new Array<number>(variables).fill(0);
  basis.forEach((column, row) => {
    if (column < variables) values[column] = Math.max(0, tableau[row]![columns]!);
  });
  return values;
}

function reducedCost(
  objective: readonly number[],
  tableau: readonly Float64Array[],
  basis: readonly number[],
  columns: number,
): Float64Array {
  const cost = new Float64Array(columns + 1);
  cost.set(objective);
  basis.forEach((column, row) => {
    const share = objective[column] ?? 0;
    if (share !== 0) for (let c = 0; c <= columns; c += 1) cost[c]! -= share * tableau[row]![c]!;
  });
  for (const column of basis) cost[column] = 0;
  return cost;
}

function firstImproving(cost: Float64Array, shut: readonly boolean[], columns: number): number {
  for (let column = 0; column < columns; column += 1)
    if (!shut[column] && cost[column]! < -tie) return column;
  return -1;
}

function tightestRow(
  tableau: readonly Float64Array[],
  basis: readonly number[],
  entering: number,
  columns: number,
): number {
  let chosen = -1;
  let least = Number.POSITIVE_INFINITY;
  for (let row = 0; row < tableau.length; row += 1) {
    const coefficient = tableau[row]![entering]!;
    if (coefficient <= smallestPivot) continue;
    const ratio = tableau[row]![columns]! / coefficient;
    if (ratio < least || (ratio === least && basis[row]! < basis[chosen]!)) {
      least = ratio;
      chosen = row;
    }
  }
  return chosen;
}

function pivot(
  tableau: Float64Array[],
  cost: Float64Array,
  row: number,
  column: number,
  columns: number,
): void {
  const line = tableau[row]!;
  const divisor = line[column]!;
  for (let c = 0; c <= columns; c += 1) line[c]! /= divisor;
  line[column] = 1;
  for (const other of [...tableau, cost]) {
    const factor = other[column]!;
    if (other === line || factor === 0) continue;
    for (let c = 0; c <= columns; c += 1) other[c]! -= factor * line[c]!;
    other[column] = 0;
    // Rounding must not carry a variable below zero; the last entry of `cost` is never read.
    if (other[columns]! < 0) other[columns] = 0;
  }
}
