import { NonPhysicalInputError } from './errors';

/**
 * Sparse symmetric positive definite systems of one pattern, solved again and again: A = L D Lᵀ.
 * The order of elimination is the greedy one of least degree, ties by index, found once; chains and trees then fill nothing in. No
 * recursion.
 */
export class SparseSymmetric {
  /** Rows in the order of their elimination. */
  private readonly order: Int32Array;
  /** By place in the order: where its column begins, and the rows of the column, all eliminated later. */
  private readonly start: Int32Array;
  private readonly rows: Int32Array;
  /** For each pair of rows of each column, in turn: the place in `values` that the elimination changes. */
  private readonly targets: Int32Array;
  /** By edge: its place in `values`. */
  private readonly placeOfEdge: Int32Array;
  private readonly values: Float64Array;
  private readonly diagonal: Float64Array;

  /**
   * @param size rows
   * @param first by edge, one end of an element off the diagonal
   * @param second the other; edges of the same two ends add up
   */
  constructor(size: number, first: Int32Array, second: Int32Array) {
    const { order, columns } = eliminationOrder(size, first, second);
    this.order = Int32Array.from(order);
    const rank = new Int32Array(size);
    order.forEach((row, place) => (rank[row] = place));
    this.start = new Int32Array(size + 1);
    columns.forEach((rows, place) => (this.start[place + 1] = (this.start[place] as number) + rows.length));
    this.rows = new Int32Array(this.start[size] as number);
    columns.forEach((rows, place) => this.rows.set(rows, this.start[place]));
    const placeIn = columns.map((rows) => new Map(rows.map((row, i) => [row, i])));
    const placeOf = (a: number, b: number): number => {
      const [early, late] = (rank[a] as number) < (rank[b] as number) ? [a, b] : [b, a];
      const column = rank[early] as number;
      return (this.start[column] as number) + (placeIn[column]?.get(late) ?? NaN);
    };
    const targets: number[] = [];
    for (const rows of columns) {
      for (let i = 0; i < rows.length; i++) {
        for (let j = i + 1; j < rows.length; j++) targets.push(placeOf(rows[i] as number, rows[j] as number));
      }
    }
    this.targets = Int32Array.from(targets);
    this.placeOfEdge = first.map((a, edge) => placeOf(a, second[edge] as number));
    this.values = new Float64Array(this.rows.length);
    this.diagonal = new Float64Array(size);
  }

  /**
   * @param diagonal by row
   * @param offDiagonal by edge
   * @param rightHandSide becomes the solution
   * @returns false where the matrix is not positive definite to rounding; the right-hand side is then of no use
   * @throws NonPhysicalInputError where the sizes do not match
   */
  solve(diagonal: Float64Array, offDiagonal: Float64Array, rightHandSide: Float64Array): boolean {
    const { length } = this.diagonal;
    if (
      diagonal.length !== length ||
      rightHandSide.length !== length ||
      offDiagonal.length !== this.placeOfEdge.length
    ) {
      throw new NonPhysicalInputError('SparseSymmetric.solve', { rows: length, given: rightHandSide.length });
    }
    this.diagonal.set(diagonal);
    this.values.fill(0);
    this.placeOfEdge.forEach((place, edge) => {
      this.values[place] = (this.values[place] as number) + (offDiagonal[edge] as number);
    });
    if (!this.factorize()) return false;
    this.substitute(rightHandSide);
    return true;
  }

  private factorize(): boolean {
    const { order, start, rows, targets, values, diagonal } = this;
    let target = 0;
    for (let place = 0; place < order.length; place++) {
      const pivot = diagonal[order[place] as number] as number;
      if (!(pivot > 0) || !Number.isFinite(pivot)) return false;
      const end = start[place + 1] as number;
      for (let i = start[place] as number; i < end; i++) {
        const value = values[i] as number;
        const share = value / pivot;
        const row = rows[i] as number;
        diagonal[row] = (diagonal[row] as number) - share * value;
        for (let j = i + 1; j < end; j++) {
          const changed = targets[target++] as number;
          values[changed] = (values[changed] as number) - share * (values[j] as number);
        }
        values[i] = share;
      }
    }
    return true;
  }

  private substitute(x: Float64Array): void {
    const { order, start, rows, values, diagonal } = this;
    for (let place = 0; place < order.length; place++) {
      const value = x[order[place] as number] as number;
      if (value === 0) continue;
      for (let i = start[place] as number; i < (start[place + 1] as number); i++) {
        const row = rows[i] as number;
        x[row] = (x[row] as number) - (values[i] as number) * value;
      }
    }
    for (let place = order.length - 1; place >= 0; place--) {
      const row = order[place] as number;
      let value = (x[row] as number) / (diagonal[row] as number);
      for (let i = start[place] as number; i < (start[place + 1] as number); i++) {
        value -= (values[i] as number) * (x[rows[i] as number] as number);
      }
      x[row] = value;
    }
  }
}

/** Takes the row with the fewest neighbours left, again and again, and joins its neighbours to each other. */
function eliminationOrder(
  size: number,
  first: Int32Array,
  second: Int32Array,
): { order: number[]; columns: number[][] } {
  const neighbours = Array.from({ length: size }, () => new Set<number>());
  first.forEach((a, edge) => {
    const b = second[edge] as number;
    neighbours[a]?.add(b);
    neighbours[b]?.add(a);
  });
  // rows by degree; one whose degree has changed since stands in the wrong bucket and is passed over
  const buckets: number[][] = [];
  const file = (row: number): void => {
    const degree = neighbours[row]?.size ?? 0;
    (buckets[degree] ??= []).push(row);
  };
  for (let row = size - 1; row >= 0; row--) file(row);
  const isDone = new Uint8Array(size);
  const order: number[] = [];
  const columns: number[][] = [];
  for (let degree = 0; order.length < size;) {
    const row = buckets[degree]?.pop();
    if (row === undefined) {
      degree++;
      continue;
    }
    const around = neighbours[row] as Set<number>;
    if (isDone[row] === 1 || around.size !== degree) continue;
    isDone[row] = 1;
    const column = [...around];
    order.push(row);
    columns.push(column);
    for (const a of column) {
      const set = neighbours[a] as Set<number>;
      set.delete(row);
      for (const b of column) if (b !== a) set.add(b);
    }
    for (const a of column) file(a);
    around.clear();
    degree = Math.max(0, degree - 1);
    for (const a of column) degree = Math.min(degree, neighbours[a]?.size ?? 0);
  }
  return { order, columns };
}
