/**
 * Reverse Cuthill–McKee order of a graph: neighbours come close to each other, so that the matrix
 * of a chain is banded. `neighbours[i]` lists the vertices next to i. Returns the vertices in
 * their new order. Source: George and Liu, Computer Solution of Large Sparse Positive Definite
 * Systems (1981), 4.3.
 */
export const bandOrder = (neighbours: readonly (readonly number[])[]): Int32Array => {
  const size = neighbours.length;
  const order = new Int32Array(size);
  const seen = new Uint8Array(size);
  let count = 0;
  for (let seed = 0; seed < size; seed++) {
    if (seen[seed] === 1) continue;
    const from = count;
    const start = farthest(neighbours, farthest(neighbours, seed));
    order[count++] = start;
    seen[start] = 1;
    for (let head = from; head < count; head++) {
      const next = neighbours[order[head]].filter((v) => seen[v] === 0);
      if (next.length > 1)
        next.sort((a, b) => neighbours[a].length - neighbours[b].length || a - b);
      for (const v of next) {
        if (seen[v] === 1) continue;
        seen[v] = 1;
        order[count++] = v;
      }
    }
  }
  return order.reverse();
};

/** The vertex found last in a breadth-first walk: an end of the graph's longest stretch. */
const farthest = (neighbours: readonly (readonly number[])[], start: number): number => {
  const queue = [start];
  const seen = new Set(queue);
  for (let head = 0; head < queue.length; head++)
    for (const v of neighbours[queue[head]])
      if (!seen.has(v)) {
        seen.add(v);
        queue.push(v);
      }
  return queue[queue.length - 1];
};
