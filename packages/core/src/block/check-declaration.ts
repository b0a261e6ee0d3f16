import { Expression } from '../equation/expression.ts';
import { formatDimension, sameDimension } from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import { type InputWiring, parameterSymbols } from './bind-equations.ts';
import { checkOperation } from './check-operation.ts';
import type { KindDeclaration } from './kind.ts';
import { readParameter } from './parameter.ts';
import { portDimension } from './port.ts';
import { reservedNames, surroundingSymbols } from './surroundings.ts';
import { equationVariants, wordings } from './variants.ts';

const namePattern = /^[a-z][A-Za-z0-9]*$/;
const kindPattern = /^[a-z][a-z0-9]*(-[a-z0-9]+)*$/;

/** Checks a declaration whole: names, defaults, and the equations in every variant. */
export function checkDeclaration(declaration: KindDeclaration): void {
  const { kind, equations, kernel } = declaration;
  if (!kindPattern.test(kind))
    throw wrong(kind, 'the name of a kind is words in small letters joined by hyphens');
  checkNames(declaration);
  for (const [name, parameter] of Object.entries(declaration.params)) {
    readParameter(parameter, parameter.initial, `${kind}.${name}`);
  }
  if ((equations === undefined) === (kernel === undefined)) {
    throw wrong(kind, 'a kind has either equations or a plain kernel, and exactly one of them');
  }
  checkResistances(declaration);
  for (const words of wordings(declaration)) checkVariants(declaration, words);
}

function wrong(kind: string, message: string): TailpairError {
  return new TailpairError('declaration', message, { where: kind });
}

function checkNames({ kind, inputs, outputs, params }: KindDeclaration): void {
  const ports = Object.entries({ ...inputs, ...outputs }).map(([port, { symbol = port }]) => symbol);
  const names = [...ports, ...Object.keys(params)];
  for (const name of names) {
    if (reservedNames.includes(name)) {
      throw wrong(kind, `${name} is reserved for the surroundings; choose another name`);
    }
    if (!namePattern.test(name)) {
      throw wrong(
        kind,
        `${name} is no name: it must start with a small letter and hold letters and digits only`,
      );
    }
  }
  const both = Object.keys(inputs).find((name) => name in outputs);
  if (both !== undefined)
    throw wrong(kind, `${both} names an input and an output; give each port its own name`);
  const twice = names.find((name, index) => names.indexOf(name) !== index);
  if (twice !== undefined)
    throw wrong(kind, `${twice} names two things; ports and parameters share one set of names`);
  if (Object.keys(outputs).length === 0) throw wrong(kind, 'a kind needs at least one output');
  const notSignal = Object.entries(outputs).find(([, port]) => (port.quantity as string) === 'node');
  if (notSignal) throw wrong(kind, `${notSignal[0]} cannot be a node; an output is a voltage or a current`);
}

/** Traces the equations for all answers their set-up questions can get, wired and unwired. */
function checkVariants(declaration: KindDeclaration, words: Record<string, string>): void {
  const wirings: ((port: string) => InputWiring)[] = [
    () => ({ direct: true, resistors: true }),
    (port) => {
      const wired = !declaration.inputs[port]?.optional;
      return { direct: wired, resistors: wired };
    },
  ];
  for (const wiring of wirings) {
    if (declaration.equations !== undefined) {
      for (const { bound } of equationVariants(declaration, words, wiring)) {
        checkOutputs(declaration, bound.equations.outputs);
      }
    }
    checkOperation(declaration, { words, wiring });
  }
}

function checkOutputs(
  { kind, outputs }: KindDeclaration,
  written: Readonly<Record<string, Expression>>,
): void {
  for (const [name, { quantity }] of Object.entries(outputs)) {
    const value = written[name];
    if (!(value instanceof Expression))
      throw wrong(
        kind,
        value === undefined
          ? `the equations give nothing for the output ${name}`
          : `the equations give the ${typeof value} ${String(value)} for the output ${name}; give a quantity, a fixed one by constant(5, dimensions.voltage)`,
      );
    const wanted = portDimension(quantity);
    if (!sameDimension(value.dimension, wanted)) {
      throw new TailpairError(
        'dimension',
        `the output ${name} = ${value} is in ${formatDimension(value.dimension)}; a ${quantity} is in ${formatDimension(wanted)}`,
        { where: kind },
      );
    }
  }
  const stray = Object.keys(written).find((name) => !(name in outputs));
  if (stray !== undefined) throw wrong(kind, `the equations give ${stray}, which is no output`);
}

function checkResistances(declaration: KindDeclaration): void {
  const { kind, inputs, outputs, resistances } = declaration;
  if (resistances === undefined) return;
  const { values } = parameterSymbols(declaration, {});
  const given = (resistances as (values: unknown) => Record<string, Expression>)({
    ...values,
    ...surroundingSymbols(),
  });
  for (const [port, value] of Object.entries(given)) {
    if (!(port in inputs) && !(port in outputs))
      throw wrong(kind, `resistances names ${port}, which is no port`);
    if (formatDimension(value.dimension) !== 'Ω') {
      throw new TailpairError(
        'dimension',
        `the resistance of ${port} is in ${formatDimension(value.dimension)}`,
        {
          where: kind,
        },
      );
    }
  }
}
