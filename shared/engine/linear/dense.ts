/** A real matrix by rows: element (i, j) lies at `values[i * columns + j]`. */
export interface Dense {
  readonly rows: number;
  readonly columns: number;
  readonly values: Float64Array;
}

export const zeros = (rows: number, columns: number): Dense => ({
  rows,
  columns,
  values: new Float64Array(rows * columns),
});

export const fromRows = (rows: readonly (readonly number[])[]): Dense => ({
  rows: rows.length,
  columns: rows.length === 0 ? 0 : rows[0].length,
  values: Float64Array.from(rows.flat()),
});

export const toRows = ({ rows, columns, values }: Dense): number[][] =>
  Array.from({ length: rows }, (_, i) =>
    Array.from(values.subarray(i * columns, (i + 1) * columns)),
  );

export const transpose = (a: Dense): Dense => {
  const t = zeros(a.columns, a.rows);
  for (let i = 0; i < a.rows; i++)
    for (let j = 0; j < a.columns; j++) t.values[j * a.rows + i] = a.values[i * a.columns + j];
  return t;
};

export const multiply = (a: Dense, b: Dense): Dense => {
  const c = zeros(a.rows, b.columns);
  for (let i = 0; i < a.rows; i++)
    for (let k = 0; k < a.columns; k++) {
      const x = a.values[i * a.columns + k];
      if (x === 0) continue;
      const from = k * b.columns;
      const to = i * b.columns;
      for (let j = 0; j < b.columns; j++) c.values[to + j] += x * b.values[from + j];
    }
  return c;
};
