import { TailpairError } from '../quantity/error.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import { requireWhole } from '../quantity/guard.ts';
import type { Trace } from '../trace/trace.ts';
import { accompany } from './accompany.ts';
import { decibels } from './decibels.ts';
import { fitLines } from './fit-lines.ts';
import { type Frequency, hertz } from './frequency.ts';
import { formatProduct, type ModulationProduct, modulationProducts } from './modulation-products.ts';
import { coincide, resolutionOf } from './record-resolution.ts';

/** What to measure sidebands of. Frequencies are texts with a unit, or bare numbers in hertz. */
export interface SidebandsOptions {
  readonly carrier: Frequency;
  readonly modulator: Frequency;
  /** Highest order on either side; 2 unless given. */
  readonly orders?: number;
}

/** One line of a modulated carrier. */
export interface Sideband {
  /** Distance from the carrier in multiples of the modulator; 0 is the carrier itself. */
  readonly order: number;
  /** Hz; a line that would lie below 0 Hz appears folded, at its magnitude. */
  readonly frequency: number;
  /** Peak, in the unit of the trace. */
  readonly amplitude: number;
  /** Level relative to the carrier as it is in the record, dB; −∞ where there is nothing. */
  readonly dBc: number;
  /**
   * Present only where other products of no higher order fall on the same line, named here: the record
   * cannot tell them apart, and the amplitude is that of all of them together.
   */
  readonly sharedWith?: string;
}

/** Orders beyond those asked for that are fitted along, so that they bias nothing. */
const spareOrders = 6;

/**
 * Table of the sidebands of a carrier, lowest order first. The harmonics of the carrier, their own
 * sidebands and those of the modulator are fitted along, as far as the record tells them apart from the
 * table's lines, so that they bias nothing; lines at other frequencies are not.
 *
 * @throws TailpairError `value-range` where the orders are no whole number above 0 or a line lies at or
 * above half the rate, `record-invalid` where two lines of the table coincide (one folded at 0 Hz), one
 * falls on DC, or there is no carrier, `record-short` where the record holds less than two periods of the
 * smallest spacing.
 * @example console.table(sidebands(load.out, { carrier: '1 kHz', modulator: '100 Hz', orders: 2 }))
 */
export function sidebands(trace: Trace, options: SidebandsOptions): readonly Sideband[] {
  const where = 'sidebands';
  const { orders = 2 } = options;
  const carrier = hertz(options.carrier, `${where}.carrier`);
  const modulator = hertz(options.modulator, `${where}.modulator`);
  requireWhole(orders, { where: `${where}.orders`, min: 1 });
  const table = Array.from({ length: 2 * orders + 1 }, (_, index): ModulationProduct => {
    const order = index - orders;
    return { harmonic: 1, order, frequency: Math.abs(carrier + order * modulator) };
  });
  requireDistinct(table, carrier, where);

  const inTable = ({ harmonic, order }: ModulationProduct): boolean =>
    harmonic === 1 && Math.abs(order) <= orders;
  const others = modulationProducts(carrier, modulator, orders + spareOrders, trace.rate).filter(
    (line) => !inTable(line),
  );
  const frequenciesOf = (lines: readonly ModulationProduct[]): number[] =>
    lines.map((line) => line.frequency);
  const { tones } = fitLines(trace, accompany(trace, frequenciesOf(table), frequenciesOf(others)), where);

  const reference = tones[orders]!.amplitude;
  if (reference === 0) {
    throw new TailpairError(
      'record-invalid',
      `${trace.name} has nothing at the carrier, ${formatQuantity(carrier, 'Hz')}, to refer sidebands to; fit the lines with fitTones`,
      { where },
    );
  }
  const resolution = resolutionOf(trace);
  return table.map(({ order, frequency }, index): Sideband => {
    const { amplitude } = tones[index]!;
    const row = { order, frequency, amplitude, dBc: decibels(amplitude / reference) };
    const sharing = others.filter(
      (line) => Math.abs(line.order) <= orders && Math.abs(line.frequency - frequency) < resolution,
    );
    return sharing.length === 0 ? row : { ...row, sharedWith: sharing.map(formatProduct).join(', ') };
  });
}

function requireDistinct(table: readonly ModulationProduct[], carrier: number, where: string): void {
  for (const [index, line] of table.entries()) {
    // Against the carrier, as rounding leaves a line on DC at a trace of it.
    const onDc = coincide(line.frequency + carrier, carrier);
    const twin = table.slice(0, index).find((other) => coincide(other.frequency, line.frequency));
    if (!onDc && twin === undefined) continue;
    const place = onDc
      ? 'DC'
      : `${formatProduct(twin!)}, ${formatQuantity(line.frequency, 'Hz')}, one of them folded at 0 Hz`;
    throw new TailpairError(
      'record-invalid',
      `${formatProduct(line)} falls on ${place}, so a record cannot tell them apart; ask for fewer orders or choose frequencies that are no simple fraction of each other`,
      { where },
    );
  }
}
