import type { Block, KindDeclaration } from '../block/kind.ts';
import { type ParameterValue, readParameter } from '../block/parameter.ts';
import { brokenRules, type ParameterValues } from '../block/set-up.ts';
import type { Surroundings } from '../block/surroundings.ts';
import { nearestName } from '../quantity/did-you-mean.ts';
import { TailpairError } from '../quantity/error.ts';
import { noting } from './collect-faults.ts';
import type { PlacedBlock } from './placed.ts';

const namePattern = /^[A-Za-z][A-Za-z0-9_-]*$/;

/** Reads all blocks with their parameters; faults are noted and the block kept, so that its wires can be checked. */
export function readBlocks(
  blocks: Readonly<Record<string, Block>>,
  surroundings: Surroundings,
  faults: TailpairError[],
): PlacedBlock[] {
  return Object.entries(blocks).map(([name, block]) => {
    if (typeof block?.kind !== 'function') {
      throw new TailpairError('value-kind', 'is no block; call its kind, such as load()', { where: name });
    }
    const { kind, given } = block;
    const { declaration } = kind;
    if (!namePattern.test(name)) {
      faults.push(
        new TailpairError(
          'declaration',
          'a block is named by a letter, then letters, digits, hyphens or underscores',
          {
            where: name,
          },
        ),
      );
    }
    refuseStrangers(name, declaration, given, faults);
    const before = faults.length;
    const parameters = readParameters(name, declaration, given, faults);
    if (faults.length === before) {
      for (const says of brokenRules(declaration, plainValues(parameters), surroundings)) {
        faults.push(new TailpairError('value-range', says, { where: name }));
      }
    }
    return { name, declaration, parameters };
  });
}

/** Parameter values without their tolerances. */
export function plainValues(parameters: Readonly<Record<string, ParameterValue>>): ParameterValues {
  return Object.fromEntries(Object.entries(parameters).map(([name, { value }]) => [name, value]));
}

function refuseStrangers(
  block: string,
  { kind, params }: KindDeclaration,
  given: Readonly<Record<string, unknown>>,
  faults: TailpairError[],
): void {
  const known = Object.keys(params);
  for (const key of Object.keys(given)) {
    if (Object.hasOwn(params, key)) continue;
    const near = nearestName(key, known);
    const cure = near === undefined ? `it has ${known.join(', ') || 'none'}` : `did you mean ${near}?`;
    faults.push(
      new TailpairError('unknown-parameter', `${kind} has no parameter ${key}; ${cure}`, { where: block }),
    );
  }
}

function readParameters(
  block: string,
  { params }: KindDeclaration,
  given: Readonly<Record<string, unknown>>,
  faults: TailpairError[],
): Record<string, ParameterValue> {
  const read: Record<string, ParameterValue> = {};
  for (const [key, parameter] of Object.entries(params)) {
    const value = given[key] ?? parameter.initial;
    read[key] = noting(faults, () => readParameter(parameter, value, `${block}.${key}`)) ?? {
      value: Number.NaN,
    };
  }
  return read;
}
