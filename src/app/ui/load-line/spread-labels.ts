export interface Label {
  /** Where its middle should stand. */
  readonly wanted: number;
  readonly height: number;
}

interface Cluster {
  readonly members: Label[];
  height: number;
  /** The middle that moves its members least, before the edges. */
  middle: number;
}

function middleOf(members: readonly Label[]): number {
  const total = members.reduce((sum, label) => sum + label.height, 0);
  let before = 0;
  let offset = 0;
  for (const { wanted, height } of members) {
    offset += wanted - (before + height / 2);
    before += height;
  }
  return offset / members.length + total / 2;
}

/**
 * Places labels along a line so that none overlaps another and each stands as near to its place as the others allow.
 * @param labels in any order; heights include the wanted gap
 * @param start where the room begins
 * @param end where it ends; when the labels need more room than there is, they run past it, still without overlap
 * @returns each label's middle, in the order given
 */
export function spreadLabels(labels: readonly Label[], start: number, end: number): number[] {
  const ordered = [...labels].sort((a, b) => a.wanted - b.wanted);
  const clusters: Cluster[] = [];
  const clamp = (middle: number, height: number): number =>
    Math.max(start + height / 2, Math.min(end - height / 2, middle));
  for (const label of ordered) {
    let cluster: Cluster = {
      members: [label],
      height: label.height,
      middle: clamp(label.wanted, label.height),
    };
    let above = clusters.at(-1);
    while (above && above.middle + above.height / 2 > cluster.middle - cluster.height / 2) {
      clusters.pop();
      const members = [...above.members, ...cluster.members];
      const height = above.height + cluster.height;
      cluster = { members, height, middle: clamp(middleOf(members), height) };
      above = clusters.at(-1);
    }
    clusters.push(cluster);
  }
  const placed = new Map<Label, number>();
  for (const { members, height, middle } of clusters) {
    let top = middle - height / 2;
    for (const label of members) {
      placed.set(label, top + label.height / 2);
      top += label.height;
    }
  }
  return labels.map((label) => placed.get(label) ?? label.wanted);
}
