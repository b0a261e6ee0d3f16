/** A line that modulation makes: `harmonic`·carrier + `order`·modulator. */
export interface ModulationProduct {
  /** Multiple of the carrier: 0 for what comes through from the modulator itself. */
  readonly harmonic: number;
  /** Multiple of the modulator, negative below the carrier. */
  readonly order: number;
  /** Hz; a line below 0 Hz appears folded, at its magnitude. */
  readonly frequency: number;
}

/** Harmonics of the carrier considered; those beyond are far off and weak. */
const mostHarmonics = 256;

/**
 * The products of a carrier and a modulator (Hz) below half the rate, to `reach` orders: the lines about
 * the carrier, then the modulator's own harmonics and the lines about every harmonic of the carrier,
 * those first that are likely to be strong. Carriers are saws and pulses, whose harmonics fade slowly:
 * ten times the harmonic counts for as little as two orders more.
 */
export function modulationProducts(
  carrier: number,
  modulator: number,
  reach: number,
  rate: number,
): readonly ModulationProduct[] {
  const products: ModulationProduct[] = [];
  for (let harmonic = 0; harmonic <= mostHarmonics; harmonic++) {
    for (let order = harmonic === 0 ? 1 : -reach; order <= reach; order++) {
      const frequency = Math.abs(harmonic * carrier + order * modulator);
      if (frequency < rate / 2) products.push({ harmonic, order, frequency });
    }
  }
  const remoteness = ({ harmonic, order }: ModulationProduct): number =>
    harmonic === 1 ? 0 : 2 * Math.log10(Math.max(harmonic, 2)) + Math.abs(order);
  return products.sort((a, b) => remoteness(a) - remoteness(b));
}

/** A product as text: `2·carrier − 3·modulator`. */
export function formatProduct({ harmonic, order }: ModulationProduct): string {
  const times = (count: number, what: string): string => (count === 1 ? what : `${count}·${what}`);
  const modulator = times(Math.abs(order), 'modulator');
  if (harmonic === 0) return modulator;
  if (order === 0) return times(harmonic, 'carrier');
  return `${times(harmonic, 'carrier')} ${order < 0 ? '−' : '+'} ${modulator}`;
}
