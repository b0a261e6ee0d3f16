import type { Surroundings } from '../block/surroundings.ts';
import { dimensions } from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import { requireRange } from '../quantity/guard.ts';
import { parseQuantity } from '../quantity/parse-quantity.ts';
import { noting } from './collect-faults.ts';

const usual = { negative: '-12 V', positive: '12 V', ambient: '25 °C' };

/** Reads the supply rails and the temperature of the board. */
export function readSurroundings(
  { supply, ambient }: { readonly supply?: readonly [string, string]; readonly ambient?: string },
  faults: TailpairError[],
): Surroundings {
  const rail = (text: string, where: string): number =>
    noting(faults, () => parseQuantity(text, dimensions.voltage, { where })) ?? Number.NaN;
  const supplyNegative = rail(supply?.[0] ?? usual.negative, 'supply negative');
  const supplyPositive = rail(supply?.[1] ?? usual.positive, 'supply positive');
  if (supplyNegative >= supplyPositive) {
    const [low, high] = [supplyNegative, supplyPositive].map((volts) =>
      formatQuantity(volts, dimensions.voltage),
    );
    faults.push(
      new TailpairError(
        'value-range',
        `the negative rail ${low} must lie below the positive rail ${high}; swap them`,
        {
          where: 'supply',
        },
      ),
    );
  }
  const temperature = noting(faults, () =>
    requireRange(parseQuantity(ambient ?? usual.ambient, dimensions.temperature, { where: 'ambient' }), {
      where: 'ambient',
      unit: dimensions.temperature,
      above: 0,
    }),
  );
  return { temperature: temperature ?? Number.NaN, supplyNegative, supplyPositive };
}
