/** Where a loop's row stands: its middle in px from the top of the column of cards. */
export interface RiserRow {
  readonly loopId: string;
  readonly y: number;
}

/** A loop that feeds others, with the rows it and they stand in. */
export interface Riser {
  readonly rootId: string;
  readonly heating: boolean;
  readonly rows: readonly RiserRow[];
}

export interface RiserSizes {
  /** Px from the left edge to the first riser, between a supply and its return, and between risers. */
  readonly first: number;
  readonly pair: number;
  readonly lane: number;
  /** Return pipes lie this far below their supply. */
  readonly drop: number;
  readonly bend: number;
  readonly main: number;
  readonly branch: number;
  /** Gap left free around a pipe where it crosses another. */
  readonly halo: number;
  /** Free run between the last riser and the cards. */
  readonly run: number;
}

export const wideSizes: RiserSizes = {
  first: 12,
  pair: 22,
  lane: 54,
  drop: 16,
  bend: 14,
  main: 11,
  branch: 7,
  halo: 5,
  run: 110,
};

export const phoneSizes: RiserSizes = {
  first: 6,
  pair: 10,
  lane: 24,
  drop: 9,
  bend: 8,
  main: 6,
  branch: 4.4,
  halo: 5,
  run: 12,
};

export interface RiserPipe {
  readonly d: string;
  readonly width: number;
  readonly leg: "supply" | "return";
  readonly heating: boolean;
  /** Where the halo starts: a branch must not cut the riser it leaves. */
  readonly haloD: string;
}

/** Width of the drawing beside the cards, px. */
export function riserWidth(count: number, sizes: RiserSizes): number {
  return count === 0 ? 0 : sizes.first + (count - 1) * sizes.lane + sizes.pair + sizes.run;
}

/**
 * Pipes of the risers in drawing order: the riser furthest right first, so that those left of it
 * cross over it, and branches last. A riser runs from its topmost to its lowest row and turns into
 * both; rows between leave it as branches.
 */
export function riserPipes(
  risers: readonly Riser[],
  right: number,
  sizes: RiserSizes,
): readonly RiserPipe[] {
  const mains: RiserPipe[] = [];
  const branches: RiserPipe[] = [];
  risers.forEach((riser, index) => {
    const ys = riser.rows.map((row) => row.y).sort((a, b) => a - b);
    const top = ys[0];
    const bottom = ys[ys.length - 1];
    if (top === undefined || bottom === undefined || bottom - top < 2 * sizes.bend) return;
    const legs = [
      { leg: "supply", x: sizes.first + index * sizes.lane, dy: 0 },
      { leg: "return", x: sizes.first + index * sizes.lane + sizes.pair, dy: sizes.drop },
    ] as const;
    for (const { leg, x, dy } of legs) {
      const d = bentRun(x, right, top + dy, bottom + dy, sizes.bend);
      mains.push({ d, haloD: d, width: sizes.main, leg, heating: riser.heating });
      for (const y of ys.slice(1, -1))
        branches.push({
          d: `M${x} ${y + dy}H${right}`,
          haloD: `M${x + sizes.main / 2 + 2.5} ${y + dy}H${right}`,
          width: sizes.branch,
          leg,
          heating: riser.heating,
        });
    }
  });
  // Reversed: each supply comes after its own return, and the leftmost riser last.
  return [...mains.reverse(), ...branches];
}

function bentRun(x: number, right: number, top: number, bottom: number, bend: number): string {
  return (
    `M${right} ${bottom}H${x + bend}a${bend} ${bend} 0 0 1 ${-bend} ${-bend}` +
    `V${top + bend}a${bend} ${bend} 0 0 1 ${bend} ${-bend}H${right}`
  );
}

interface FedLoop {
  readonly id: string;
  readonly parentLoopId: string | null;
  readonly heating: boolean;
}

/** Loops that feed others, cooling first, each with everything that hangs on it. */
export function risersOf(loops: readonly FedLoop[]): { root: FedLoop; members: FedLoop[] }[] {
  const byId = new Map(loops.map((loop) => [loop.id, loop]));
  const rootOf = (loop: FedLoop): FedLoop => {
    let at = loop;
    // The server refuses rings; a step limit keeps a broken answer from hanging the screen.
    for (let steps = 0; steps < loops.length; steps++) {
      const parent = at.parentLoopId === null ? undefined : byId.get(at.parentLoopId);
      if (parent === undefined) return at;
      at = parent;
    }
    return at;
  };
  const groups = new Map<string, { root: FedLoop; members: FedLoop[] }>();
  for (const loop of loops) {
    const root = rootOf(loop);
    const group = groups.get(root.id) ?? { root, members: [] };
    group.members.push(loop);
    groups.set(root.id, group);
  }
  return [...groups.values()]
    .filter((group) => group.members.length > 1)
    .sort((a, b) => Number(a.root.heating) - Number(b.root.heating));
}
