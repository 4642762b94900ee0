import { samePole, type WantedPole } from "./wanted-poles";

/**
 * Ways to string repeated poles into chains of principal vectors, the most even first: as many chains as there are inputs, then
 * longer first ones, then fewer. A chain lists places of blocks; its first is an eigenvector, each later one leans on the one before.
 */
export function chainPlans(blocks: readonly WantedPole[], rank: number): number[][][] {
  const groups = groupEqual(blocks);
  const most = Math.max(...groups.map((group) => group.length));
  const plans = new Map<string, number[][]>();
  for (let chains = Math.min(rank, most); chains >= 1; chains--) {
    for (let skew = 0; skew < most; skew++) {
      const plan = groups.flatMap((group) => strung(group, chains, skew));
      const shape = JSON.stringify(plan);
      if (!plans.has(shape)) plans.set(shape, plan);
    }
  }
  return [...plans.values()];
}

function groupEqual(blocks: readonly WantedPole[]): number[][] {
  const groups: number[][] = [];
  blocks.forEach((block, place) => {
    const group = groups.find(([first]) => samePole(blocks[first], block));
    if (group) group.push(place);
    else groups.push([place]);
  });
  return groups;
}

/** A group cut into at most that many chains of like length, `skew` places moved from the last ones to the first. */
function strung(group: readonly number[], most: number, skew: number): number[][] {
  const chains = Math.min(most, group.length);
  const lengths = Array.from({ length: chains }, (_, c) => Math.floor((group.length + chains - 1 - c) / chains));
  for (let moved = 0; moved < skew; moved++) {
    const last = lengths.findLastIndex((length) => length > 0);
    if (last <= 0) break;
    lengths[last]--;
    lengths[0]++;
  }
  let from = 0;
  return lengths
    .filter((length) => length > 0)
    .map((length) => {
      from += length;
      return group.slice(from - length, from);
    });
}
