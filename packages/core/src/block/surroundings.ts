import { type Expression, leaf } from '../equation/expression.ts';
import { thermalVoltage } from '../quantity/constants.ts';
import { dimensions } from '../quantity/dimension.ts';

/** What every block can see of its surroundings, as symbols of its equations. */
export interface SurroundingSymbols {
  /** Time since the start of the run. */
  readonly time: Expression;
  /** Absolute temperature of the block. */
  readonly temperature: Expression;
  /** Thermal voltage kT/q at that temperature. */
  readonly thermalVoltage: Expression;
  /** Positive supply rail. */
  readonly supplyPositive: Expression;
  /** Negative supply rail. */
  readonly supplyNegative: Expression;
}

/** The surroundings of a run in numbers, SI base units. */
export interface Surroundings {
  readonly temperature: number;
  readonly supplyPositive: number;
  readonly supplyNegative: number;
}

/** Names no port or parameter may take. */
export const reservedNames: readonly string[] = [
  'time',
  'temperature',
  'thermalVoltage',
  'supplyPositive',
  'supplyNegative',
];

/** New symbols for the surroundings of one block. */
export function surroundingSymbols(): SurroundingSymbols {
  return {
    time: leaf('time', 'time', dimensions.time),
    temperature: leaf('surrounding', 'temperature', dimensions.temperature),
    thermalVoltage: leaf('surrounding', 'thermalVoltage', dimensions.voltage),
    supplyPositive: leaf('surrounding', 'supplyPositive', dimensions.voltage),
    supplyNegative: leaf('surrounding', 'supplyNegative', dimensions.voltage),
  };
}

/** Values of those symbols (all but time, which moves). */
export function bindSurroundings(
  symbols: SurroundingSymbols,
  { temperature, supplyPositive, supplyNegative }: Surroundings,
): Map<Expression, number> {
  return new Map([
    [symbols.temperature, temperature],
    [symbols.thermalVoltage, thermalVoltage(temperature)],
    [symbols.supplyPositive, supplyPositive],
    [symbols.supplyNegative, supplyNegative],
  ]);
}
