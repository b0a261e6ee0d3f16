import type { Trace } from './trace.ts';

type BlockOf<Probe extends string> = Probe extends `${infer Block}.${string}` ? Block : never;
type PortOf<Probe extends string, Block extends string> = Probe extends `${Block}.${infer Port}`
  ? Port
  : never;

/** Traces by block and port: the probe `load.out` is found at `traces.load.out`. */
export type ProbeTraces<Probe extends string> = {
  readonly [Block in BlockOf<Probe>]: { readonly [Port in PortOf<Probe, Block>]: Trace };
};

/** Sorts traces by the block and port their names tell. */
export function probeTraces<Probe extends string>(traces: readonly Trace[]): ProbeTraces<Probe> {
  const sorted: Record<string, Record<string, Trace>> = {};
  for (const trace of traces) {
    const [block = '', port = ''] = trace.name.split('.');
    sorted[block] = { ...sorted[block], [port]: trace };
  }
  return sorted as ProbeTraces<Probe>;
}
