import { bias, coupling, divider, envelope, gate, lfo, load, oscillator, ota } from '@tailpair/blocks';
import { type Patch, patch, wire } from '@tailpair/core';

/** The voice the C program in `c/` computes as well; see there for its stages. */
export function referenceVoice(): Patch<'couple.out'> {
  return patch(
    {
      blocks: {
        drift: lfo({ shape: 'triangle', frequency: '0.3 Hz', amplitude: '20 mV' }),
        saw: oscillator({ shape: 'saw', frequency: '440 Hz', amplitude: '5 V' }),
        pad: divider({ top: '99k', bottom: '1k' }),
        key: gate({ held: '0.6 s', period: '1 s' }),
        contour: envelope({
          attack: '5 ms',
          decay: '80 ms',
          sustain: '60 %',
          release: '120 ms',
          rest: '-12 V',
          peak: '-2 V',
        }),
        swing: lfo({ frequency: '5 Hz', amplitude: '1.5 V', offset: '-10.5 V' }),
        pin: bias(),
        cell: ota({ offset: '0.5 mV' }),
        load: load({ capacitance: '1 nF' }),
        couple: coupling(),
      },
    },
    (b) => [
      wire(b.drift.out, b.saw.pitch),
      wire(b.saw.out, b.pad.in),
      wire(b.pad.out, b.cell.plus),
      wire(b.key.out, b.contour.gate),
      wire(b.contour.out, b.pin.pin, { via: '120k' }),
      wire(b.swing.out, b.pin.pin, { via: '120k' }),
      wire(b.pin.out, b.cell.bias),
      wire(b.cell.out, b.load.in),
      wire(b.load.out, b.couple.in),
    ],
  );
}
