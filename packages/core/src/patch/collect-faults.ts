import { TailpairError } from '../quantity/error.ts';

/** Runs `build`, which may note faults and go on; throws what was noted, all at once. */
export function collectFaults<T>(build: (faults: TailpairError[]) => T): T {
  const faults: TailpairError[] = [];
  const built = build(faults);
  const [first] = faults;
  if (first === undefined) return built;
  if (faults.length === 1) throw first;
  const list = faults.map(({ message }) => `  ${message}`).join('\n');
  throw new TailpairError('patch-faults', `the patch has ${faults.length} faults:\n${list}`, { faults });
}

/** Runs `read`; a fault in it is noted and `undefined` returned. */
export function noting<T>(faults: TailpairError[], read: () => T): T | undefined {
  try {
    return read();
  } catch (error) {
    if (!(error instanceof TailpairError)) throw error;
    faults.push(error);
    return undefined;
  }
}
