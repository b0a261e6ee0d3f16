import { nearestName } from '../quantity/did-you-mean.ts';
import { dimensions } from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import { requireRange } from '../quantity/guard.ts';
import { parsePart } from '../quantity/parse-part.ts';
import { noting } from './collect-faults.ts';
import type { PlacedBlock, PlacedWire } from './placed.ts';
import { type InputHandle, type OutputHandle, portName, type Wire } from './wire.ts';

/** Reads and checks all wires: ends, families, resistors, fan-in, fan-out, and inputs left open. */
export function readWires(
  blocks: readonly PlacedBlock[],
  wires: readonly Wire[],
  faults: TailpairError[],
): PlacedWire[] {
  const placed = wires.flatMap((given) => noting(faults, () => readWire(blocks, given)) ?? []);
  checkFanIn(blocks, placed, faults);
  checkFanOut(blocks, placed, faults);
  checkOpenInputs(blocks, wires, faults);
  return placed;
}

function readWire(blocks: readonly PlacedBlock[], { from, to, via }: Wire): PlacedWire {
  if (from?.side !== 'output' || to?.side !== 'input') throw wrongWay(from, to);
  const source = quantityOf(blocks, from);
  const target = quantityOf(blocks, to);
  const where = `${portName(from)} -> ${portName(to)}`;
  const family = `${source} to ${target}`;
  switch (family) {
    case 'voltage to voltage':
    case 'current to current':
    case 'current to node':
      if (via !== undefined) {
        throw new TailpairError(
          'wire-resistor',
          `a ${family} wire takes no resistor, got ${via}; only a voltage into a node comes in through one`,
          { where },
        );
      }
      return { from: end(from), to: end(to), via: undefined };
    case 'voltage to node': {
      if (via === undefined) {
        throw new TailpairError(
          'wire-resistor',
          'a voltage comes into a node through a resistor; name it, such as via 120k',
          { where },
        );
      }
      const part = parsePart(via, dimensions.resistance, where);
      requireRange(part.value, { where, above: 0, unit: dimensions.resistance });
      return { from: end(from), to: end(to), via: part };
    }
    case 'current to voltage':
      throw new TailpairError(
        'wire-family',
        'a current into a voltage input has no defined voltage; put a load or a current-to-voltage stage between',
        { where },
      );
    default:
      throw new TailpairError(
        'wire-family',
        `a ${source} cannot drive a ${target} input; put a current-drive or a resistor into a node between`,
        { where },
      );
  }
}

function end({ block, port }: { block: string; port: string }): { block: string; port: string } {
  return { block, port };
}

function wrongWay(
  from: OutputHandle | InputHandle | undefined,
  to: OutputHandle | InputHandle | undefined,
): TailpairError {
  const name = (handle: OutputHandle | InputHandle | undefined): string =>
    handle === undefined ? 'nothing' : `the ${handle.side} ${portName(handle)}`;
  return new TailpairError(
    'unknown-port',
    `a wire runs from an output to an input, got ${name(from)} to ${name(to)}`,
  );
}

function quantityOf(blocks: readonly PlacedBlock[], handle: OutputHandle | InputHandle): string {
  const block = blocks.find(({ name }) => name === handle.block);
  if (block === undefined) {
    const near = nearestName(
      handle.block,
      blocks.map(({ name }) => name),
    );
    throw new TailpairError(
      'unknown-block',
      `there is no such block${near === undefined ? '' : `; did you mean ${near}?`}`,
      {
        where: handle.block,
      },
    );
  }
  const ports = handle.side === 'input' ? block.declaration.inputs : block.declaration.outputs;
  const port = Object.hasOwn(ports, handle.port) ? ports[handle.port] : undefined;
  if (port === undefined) {
    const known = Object.keys(ports);
    const near = nearestName(handle.port, known);
    throw new TailpairError(
      'unknown-port',
      `${block.declaration.kind} has no ${handle.side} ${handle.port}; ${near === undefined ? `it has ${known.join(', ') || 'none'}` : `did you mean ${near}?`}`,
      { where: portName(handle) },
    );
  }
  return port.quantity;
}

function portQuantity(
  blocks: readonly PlacedBlock[],
  side: 'inputs' | 'outputs',
  at: { block: string; port: string },
): string {
  return blocks.find(({ name }) => name === at.block)!.declaration[side][at.port]!.quantity;
}

function checkFanIn(
  blocks: readonly PlacedBlock[],
  wires: readonly PlacedWire[],
  faults: TailpairError[],
): void {
  for (const [input, drivers] of groupBy(wires, ({ to }) => portName(to))) {
    if (drivers.length < 2 || portQuantity(blocks, 'inputs', drivers[0]!.to) !== 'voltage') continue;
    const names = drivers.map(({ from }) => portName(from)).join(' and ');
    faults.push(
      new TailpairError(
        'wire-fan-in',
        `has ${drivers.length} drivers, ${names}; a voltage input takes one, so sum them in a mixer`,
        {
          where: input,
        },
      ),
    );
  }
}

function checkFanOut(
  blocks: readonly PlacedBlock[],
  wires: readonly PlacedWire[],
  faults: TailpairError[],
): void {
  for (const [output, takers] of groupBy(wires, ({ from }) => portName(from))) {
    if (takers.length < 2 || portQuantity(blocks, 'outputs', takers[0]!.from) !== 'current') continue;
    const names = takers.map(({ to }) => portName(to)).join(' and ');
    faults.push(
      new TailpairError(
        'wire-fan-out',
        `feeds ${takers.length} inputs, ${names}; a current flows into one, so add a mirror or a second bias block`,
        { where: output },
      ),
    );
  }
}

function checkOpenInputs(
  blocks: readonly PlacedBlock[],
  wires: readonly Wire[],
  faults: TailpairError[],
): void {
  for (const { name, declaration } of blocks) {
    for (const [port, { optional, quantity }] of Object.entries(declaration.inputs)) {
      if (optional || wires.some(({ to }) => to?.block === name && to?.port === port)) continue;
      faults.push(
        new TailpairError(
          'input-missing',
          `nothing is wired to this ${quantity} input of ${declaration.kind}; wire a ${quantity === 'node' ? 'current, or a voltage through a resistor,' : quantity} to it`,
          {
            where: `${name}.${port}`,
          },
        ),
      );
    }
  }
}

function groupBy<T>(items: readonly T[], key: (item: T) => string): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const item of items) groups.set(key(item), [...(groups.get(key(item)) ?? []), item]);
  return groups;
}
