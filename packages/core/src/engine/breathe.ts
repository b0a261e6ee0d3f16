/** The one timer that every JavaScript environment has; core is compiled without its types. */
const { setTimeout } = globalThis as unknown as {
  setTimeout(call: () => void, milliseconds: number): unknown;
};

/** Milliseconds of computing after which others get their turn. */
const breath = 40;

/** A pause whenever a run has computed for a while, so that signals and timers are heard. */
export function breather(): () => Promise<void> {
  let last = Date.now();
  return async () => {
    if (Date.now() - last < breath) return;
    await new Promise<void>((resolve) => setTimeout(resolve, 0));
    last = Date.now();
  };
}
