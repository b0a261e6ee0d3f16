import type { Trace } from './trace.ts';

/** Traces by block and port: the probe `load.out` is found at `traces.load.out`. */
export type ProbeTraces<Probe extends string> = {
  readonly [Block in Probe extends `${infer Name}.${string}` ? Name : never]: {
    readonly [Port in Probe extends `${Block}.${infer Name}` ? Name : never]: Trace;
  };
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
