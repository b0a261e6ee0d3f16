import { TailpairError } from '@tailpair/core';
import {
  amperes,
  choice,
  current,
  defineBlock,
  farads,
  held,
  isZero,
  ohms,
  onCrossing,
  select,
  set,
  state,
  states,
  tanh,
  voltage,
  volts,
} from '@tailpair/core/block';
import { describe, expect, test } from 'vitest';

const face = {
  kind: 'test-kind',
  summary: 'For tests.',
  inputs: { in: voltage(), flow: current() },
  outputs: { out: voltage() },
  params: { resistance: ohms('1k'), capacitance: farads('1 nF'), level: volts('1 V') },
} as const;

function fault(define: () => unknown): TailpairError {
  try {
    define();
  } catch (error) {
    if (error instanceof TailpairError) return error;
    throw error;
  }
  throw new Error('nothing was refused');
}

describe('wrong physics is refused when a kind is defined, and the expression is named', () => {
  test('volts plus amperes', () => {
    const { code, message } = fault(() =>
      defineBlock({ ...face, equations: (s) => ({ out: s.in.add(s.flow) }) }),
    );
    expect(code).toBe('dimension');
    expect(message).toBe('add: in is in V, flow is in A; both sides must have one dimension');
  });

  test('tanh of a voltage', () => {
    const { code, message } = fault(() =>
      defineBlock({ ...face, equations: (s) => ({ out: s.level.mul(tanh(s.in.mul(2))) }) }),
    );
    expect(code).toBe('dimension');
    expect(message).toContain('tanh(in · 2)');
    expect(message).toContain('in V');
  });

  test('a slope without per-second', () => {
    const { code, message } = fault(() =>
      defineBlock({ ...face, equations: (s) => ({ out: state('0 V', (v) => s.in.sub(v)) }) }),
    );
    expect(code).toBe('dimension');
    expect(message).toContain('the slope in − x1 of a state in V is in V; it must be in V/s');
  });

  test('a slope in volts per ampere', () => {
    const { message } = fault(() =>
      defineBlock({ ...face, equations: (s) => ({ out: state('0 V', (v) => s.in.sub(v).div(s.flow)) }) }),
    );
    expect(message).toContain('is in Ω; it must be in V/s');
  });

  test('an output of another dimension', () => {
    const { code, message } = fault(() => defineBlock({ ...face, equations: (s) => ({ out: s.flow }) }));
    expect(code).toBe('dimension');
    expect(message).toBe('test-kind: the output out = flow is in A; a voltage is in V');
  });

  test('choices of two dimensions, and a limit of another', () => {
    expect(
      fault(() => defineBlock({ ...face, equations: (s) => ({ out: select(s.in.gt('0 V'), s.in, s.flow) }) }))
        .message,
    ).toContain('select: in is in V, flow is in A');
    expect(
      fault(() => defineBlock({ ...face, equations: (s) => ({ out: s.in.clamp('0 A', s.level) }) })).code,
    ).toBe('quantity-unit');
  });

  test('a mistake in a variant that is not the default', () => {
    const params = { ...face.params, shape: choice(['flat', 'bent'], 'flat') };
    const bent = (s: { shape: string; in: unknown; flow: unknown }): object => ({
      out: s.shape === 'flat' ? s.in : s.flow,
    });
    expect(fault(() => defineBlock({ ...face, params, equations: bent } as never)).code).toBe('dimension');
    expect(
      fault(() =>
        defineBlock({ ...face, equations: (s) => ({ out: isZero(s.capacitance) ? s.flow : s.in }) }),
      ).code,
    ).toBe('dimension');
  });
});

describe('a declaration that contradicts itself is refused', () => {
  const equations = (s: { in: never }): never => ({ out: s.in }) as never;
  const refusal = (change: object): TailpairError =>
    fault(() => defineBlock({ ...face, equations, ...change } as never));

  test.each(['time', 'temperature', 'thermalVoltage', 'supplyPositive', 'supplyNegative'])(
    'reserved name %s',
    (name) => {
      const { code, message } = refusal({ params: { [name]: volts('1 V') } });
      expect(code).toBe('declaration');
      expect(message).toContain(`${name} is reserved`);
    },
  );

  test('a name for two things', () => {
    expect(refusal({ params: { in: volts('1 V') } }).message).toContain('in names two things');
  });

  test('a kind, a port or a parameter that is no name', () => {
    expect(refusal({ kind: 'Test Kind' }).code).toBe('declaration');
    expect(refusal({ params: { 'max-bias': amperes('1 A') } }).code).toBe('declaration');
  });

  test('neither or both of equations and kernel', () => {
    expect(refusal({ equations: undefined }).code).toBe('declaration');
    expect(refusal({ kernel: () => ({ run: () => {} }) }).code).toBe('declaration');
  });

  test('a default out of its own range', () => {
    expect(refusal({ params: { level: volts('1 V', { max: '0.5 V' }) } }).code).toBe('value-range');
  });

  test('memory outside equations, and a write to what is no memory', () => {
    expect(fault(() => state('0 V', (v) => v.div('1 s'))).message).toContain("inside a block's equations");
    expect(
      fault(() =>
        defineBlock({
          ...face,
          equations: (s) => {
            onCrossing(s.in, () => [set(s.in, '0 V')]);
            return { out: s.in };
          },
        }),
      ).message,
    ).toContain('set: in is no memory');
  });
});

test('coupled states, held memory and limits can be declared', () => {
  const kind = defineBlock({
    ...face,
    equations: (s) => {
      const tau = s.resistance.mul(s.capacitance);
      const { x, y } = states(
        { x: '0 V', y: '0 V' },
        (v) => ({ x: s.in.sub(v.x).sub(v.y).div(tau), y: v.x.div(tau) }),
        { y: { min: '-1 V', max: s.level } },
      );
      const last = held('0 V');
      onCrossing(y, () => [set(last, x)]);
      return { out: y.add(last) };
    },
  });
  expect(kind.declaration.kind).toBe('test-kind');
});
