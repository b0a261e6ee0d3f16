import type { Patch } from '../patch/patch.ts';
import type { PlacedBlock, PlacedWire } from '../patch/placed.ts';
import { TailpairError } from '../quantity/error.ts';

/** The order in which a patch's blocks are computed, as inspectable data. */
export interface Schedule {
  /** Every block after all blocks that feed it; otherwise in the order of the patch. */
  readonly order: readonly PlacedBlock[];
}

/**
 * Orders the blocks of a patch so that each is computed after those that feed it.
 *
 * @throws TailpairError `loop` where blocks feed each other in a ring, naming its path
 */
export function schedule({ blocks, wires }: Pick<Patch, 'blocks' | 'wires'>): Schedule {
  const order: PlacedBlock[] = [];
  const waiting = new Set(blocks);
  while (waiting.size > 0) {
    const waitingNames = new Set([...waiting].map(({ name }) => name));
    const ready = [...waiting].find(({ name }) =>
      wires.every(({ from, to }) => to.block !== name || !waitingNames.has(from.block)),
    );
    if (ready === undefined) throw ring(findRing([...waitingNames], wires));
    order.push(ready);
    waiting.delete(ready);
  }
  return { order };
}

/** Follows the wires back from any block that waits; each has a waiting feeder, so it must come round. */
function findRing(waiting: readonly string[], wires: readonly PlacedWire[]): PlacedWire[] {
  const path: PlacedWire[] = [];
  let at = waiting[0]!;
  for (;;) {
    const back = wires.find(({ from, to }) => to.block === at && waiting.includes(from.block))!;
    path.unshift(back);
    const closing = path.findIndex(({ to }) => to.block === back.from.block);
    if (closing >= 0) return path.slice(0, closing + 1);
    at = back.from.block;
  }
}

function ring(path: readonly PlacedWire[]): TailpairError {
  const [first] = path;
  const text = path.map(({ from, to }) => `${from.block}.${from.port} -> ${to.block}.${to.port}`).join(', ');
  return new TailpairError(
    'loop',
    `the blocks feed each other in a ring: ${text}; a ring of blocks cannot be run yet, so open one of these wires`,
    { where: first?.from.block },
  );
}
