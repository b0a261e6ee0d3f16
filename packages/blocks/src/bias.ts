import { amperes, current, defineBlock, isZero, log, node, ratio } from '@tailpair/core/block';
import { saturationCurrent, wrightOmega } from './shared/diode.ts';

/**
 * The bias pin of a cell: diodes above the negative rail. With the resistors that come in taken
 * as one source of open-circuit voltage V above the rail and conductance G, Kirchhoff's law
 * G·(V − V_pin) = I, V_pin = N·V_T·ln(1 + I/I_S) has the solution
 * I = N·V_T·G·ω(y) − I_S, y = ln(I_S/(N·V_T·G)) + (V + I_S/G)/(N·V_T)
 * (T. Banwell, A. Jayakumar, Electronics Letters 36(4), 2000; from memory).
 */
export const bias = defineBlock({
  kind: 'bias',
  summary:
    'Bias pin: turns what comes in through resistors into a bias current, one or more diode drops above the negative rail.',
  inputs: { pin: node({ doc: 'the pin; it sits just above the negative rail' }) },
  outputs: { out: current({ doc: 'bias current, never below zero' }) },
  params: {
    diodeCurrent: amperes('10 fA', { above: '0 A', doc: 'saturation current of the junction at 25 °C' }),
    diodeDrops: ratio(1, {
      min: 0.5,
      max: 4,
      doc: 'junctions between pin and rail: 1, or 2 for a stacked mirror',
    }),
  },
  limits: () => ({ out: { min: '0 A' } }),
  potentials: ({ pin, out, diodeCurrent, diodeDrops, temperature, thermalVoltage, supplyNegative }) => {
    const arriving = pin.current.add(pin.drive);
    if (!isZero(pin.conductance)) return { pin: arriving.sub(out).div(pin.conductance) };
    const saturation = saturationCurrent(diodeCurrent, temperature, thermalVoltage);
    return { pin: supplyNegative.add(diodeDrops.mul(thermalVoltage).mul(log(out.div(saturation).add(1)))) };
  },
  equations: ({ pin, diodeCurrent, diodeDrops, temperature, thermalVoltage, supplyNegative }) => {
    const arriving = pin.current.add(pin.drive);
    if (isZero(pin.conductance)) return { out: arriving.max('0 A') };
    const saturation = saturationCurrent(diodeCurrent, temperature, thermalVoltage);
    const perDecay = diodeDrops.mul(thermalVoltage).mul(pin.conductance);
    const still = saturation
      .sub(supplyNegative.mul(pin.conductance))
      .div(perDecay)
      .add(log(saturation.div(perDecay)));
    const y = arriving.div(perDecay).add(still);
    return { out: wrightOmega(y).mul(perDecay).sub(saturation).max('0 A') };
  },
});
