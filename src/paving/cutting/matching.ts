/**
 * The most pairs that can be made of things of which each is in one pair at most (Edmonds' blossom
 * algorithm, in cubic time). `near[n]` lists those that n may be paired with; the answer gives each
 * one's partner, −1 where it has none.
 */
export function mostPairs(near: readonly (readonly number[])[]): Int32Array {
  const count = near.length;
  const mate = new Int32Array(count).fill(-1);
  const parent = new Int32Array(count);
  const base = new Int32Array(count);
  const queued = new Uint8Array(count);
  const inBlossom = new Uint8Array(count);
  const onPath = new Uint8Array(count);

  // A greedy start leaves few for the searches.
  for (let n = 0; n < count; n++) {
    if (mate[n] >= 0) continue;
    const other = near[n].find((m) => m !== n && mate[m] < 0);
    if (other === undefined) continue;
    mate[n] = other;
    mate[other] = n;
  }

  const commonBase = (a: number, b: number): number => {
    onPath.fill(0);
    for (let at = a; ;) {
      at = base[at];
      onPath[at] = 1;
      if (mate[at] < 0) break;
      at = parent[mate[at]];
    }
    for (let at = b; ;) {
      at = base[at];
      if (onPath[at]) return at;
      at = parent[mate[at]];
    }
  };
  const markPath = (from: number, top: number, child: number) => {
    for (let at = from; base[at] !== top;) {
      inBlossom[base[at]] = 1;
      inBlossom[base[mate[at]]] = 1;
      parent[at] = child;
      child = mate[at];
      at = parent[mate[at]];
    }
  };

  /** The free end of a path from `root` along which pairs can be swapped for one more; −1 when there is none. */
  const freeEnd = (root: number): number => {
    queued.fill(0);
    parent.fill(-1);
    for (let n = 0; n < count; n++) base[n] = n;
    const queue = [root];
    queued[root] = 1;
    for (let head = 0; head < queue.length; head++) {
      const from = queue[head];
      for (const to of near[from]) {
        if (to === from || base[from] === base[to] || mate[from] === to) continue;
        if (to === root || (mate[to] >= 0 && parent[mate[to]] >= 0)) {
          // An odd ring of alternating pairs closes: it is drawn together into its base.
          const top = commonBase(from, to);
          inBlossom.fill(0);
          markPath(from, top, to);
          markPath(to, top, from);
          for (let n = 0; n < count; n++) {
            if (!inBlossom[base[n]]) continue;
            base[n] = top;
            if (queued[n]) continue;
            queued[n] = 1;
            queue.push(n);
          }
        } else if (parent[to] < 0) {
          parent[to] = from;
          if (mate[to] < 0) return to;
          queued[mate[to]] = 1;
          queue.push(mate[to]);
        }
      }
    }
    return -1;
  };

  for (let root = 0; root < count; root++) {
    if (mate[root] >= 0) continue;
    for (let at = freeEnd(root); at >= 0;) {
      const before = parent[at];
      const next = mate[before];
      mate[at] = before;
      mate[before] = at;
      at = next;
    }
  }
  return mate;
}
