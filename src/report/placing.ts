/** Something of `size` that wants its middle at `at`. */
export interface Wish {
  readonly at: number;
  readonly size: number;
}

interface Cluster {
  readonly members: number[];
  size: number;
  /** sum over the members of where each wants the cluster to begin */
  starts: number;
}

/**
 * Middles near the wished ones so that nothing overlaps and all is between `from` and `to`, in the wishes' order along the line; in
 * the order of `wishes`. Neighbours that would overlap are pooled and the pool is centred on its wishes, which is the least-squares
 * placing (pool adjacent violators). Wishes that fill more than there is run over `to`.
 */
export function spread(wishes: readonly Wish[], from: number, to: number): number[] {
  const clusters: Cluster[] = [];
  for (const index of wishes.map((_, i) => i).sort((a, b) => wishes[a]!.at - wishes[b]!.at || a - b)) {
    const { at, size } = wishes[index]!;
    let cluster: Cluster = { members: [index], size, starts: at - size / 2 };
    let before = clusters.at(-1);
    while (before && startOf(before, from, to) + before.size > startOf(cluster, from, to)) {
      clusters.pop();
      cluster = {
        members: [...before.members, ...cluster.members],
        size: before.size + cluster.size,
        starts: before.starts + cluster.starts - before.size * cluster.members.length,
      };
      before = clusters.at(-1);
    }
    clusters.push(cluster);
  }
  const middles = new Array<number>(wishes.length).fill(from);
  for (const cluster of clusters) {
    let start = startOf(cluster, from, to);
    for (const index of cluster.members) {
      middles[index] = start + wishes[index]!.size / 2;
      start += wishes[index]!.size;
    }
  }
  return middles;
}

const startOf = ({ members, size, starts }: Cluster, from: number, to: number): number =>
  Math.max(from, Math.min(starts / members.length, to - size));
