import { amperes, current, defineBlock, ratio, tanh, voltage, volts } from '@tailpair/core/block';

/**
 * Transconductance cell: the large-signal law of a bipolar differential pair with ideal mirrors
 * (P. Gray, P. Hurst, S. Lewis, R. Meyer, Analysis and Design of Analog Integrated Circuits,
 * 5th ed., 2009, on the emitter-coupled pair; from memory). The linear range
 * stated as a limit, ±2V_T between the inputs, is where the gain of the pair has fallen to sech²1 = 42 %
 * (common practice). Left out: output conductance, input bias current, noise.
 */
export const ota = defineBlock({
  kind: 'ota',
  summary: 'Transconductance cell: differential voltage in, current out, gain set by the bias current.',
  inputs: {
    plus: voltage({ optional: true, doc: 'non-inverting input' }),
    minus: voltage({ optional: true, doc: 'inverting input' }),
    bias: current({ doc: 'bias current' }),
  },
  outputs: { out: current({ doc: 'output current, at most the bias current either way' }) },
  params: {
    maxBias: amperes('1 mA', { min: '0 A', doc: 'largest bias current the cell makes use of' }),
    offset: volts('0 V', { doc: 'input offset voltage' }),
    gainError: ratio('0 %', { above: -1, doc: 'deviation of the mirrors that scales the output' }),
    outputOffset: ratio('0 %', {
      doc: 'output current at balance as a share of the bias current; half of a mirror mismatch',
    }),
  },
  limits: ({ plus, minus, maxBias, thermalVoltage }) => {
    const reach = thermalVoltage.mul(2);
    return {
      plus: { min: minus.sub(reach), max: minus.add(reach) },
      minus: { min: plus.sub(reach), max: plus.add(reach) },
      bias: { min: '0 A', max: maxBias },
    };
  },
  equations: ({ plus, minus, bias, maxBias, offset, gainError, outputOffset, thermalVoltage }) => {
    const drive = plus.sub(minus).add(offset).div(thermalVoltage.mul(2));
    return { out: bias.clamp('0 A', maxBias).mul(tanh(drive).mul(gainError.add(1)).add(outputOffset)) };
  },
});
