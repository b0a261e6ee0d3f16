import { resistancesOf } from '../block/set-up.ts';
import type { Surroundings } from '../block/surroundings.ts';
import { dimensions } from '../quantity/dimension.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import type { PlacedBlock, PlacedWire, Warning } from './placed.ts';
import { plainValues } from './read-blocks.ts';
import { portName } from './wire.ts';

/** Errors smaller than this are left unsaid. */
const smallestDecibels = 0.005;

/**
 * Warnings for voltage outputs that are loaded: a source of resistance R_s that feeds a total of
 * R loses 20·lg(1 + R_s/R) dB, which a run does not yet take into account.
 */
export function loadingWarnings(
  blocks: readonly PlacedBlock[],
  wires: readonly PlacedWire[],
  surroundings: Surroundings,
): Warning[] {
  const resistances = new Map(
    blocks.map(({ name, declaration, parameters }) => [
      name,
      resistancesOf(declaration, plainValues(parameters), surroundings),
    ]),
  );
  return blocks.flatMap(({ name, declaration }) =>
    Object.entries(declaration.outputs).flatMap(([port, { quantity }]) => {
      const source = resistances.get(name)?.[port] ?? 0;
      if (quantity !== 'voltage' || !(source > 0)) return [];
      const taken = wires.filter(({ from }) => from.block === name && from.port === port);
      const conductance = taken.reduce(
        (sum, { to, via }) =>
          sum + 1 / (via?.value ?? resistances.get(to.block)?.[to.port] ?? Number.POSITIVE_INFINITY),
        0,
      );
      const loss = 20 * Math.log10(1 + source * conductance);
      if (!(loss >= smallestDecibels)) return [];
      const where = portName({ block: name, port });
      const [own, load] = [source, 1 / conductance].map((ohms) =>
        formatQuantity(ohms, dimensions.resistance, 3),
      );
      const takers = taken.map(({ to }) => portName(to)).join(', ');
      return [
        {
          code: 'loading' as const,
          where,
          message: `${where}: its source resistance of ${own} is loaded by ${load} at ${takers}; the true level is ${loss.toFixed(2)} dB lower than computed, so put a buffer between`,
        },
      ];
    }),
  );
}
