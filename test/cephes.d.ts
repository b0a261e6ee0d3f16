/** The special functions the tests use; the types the library ships stand where the compiler does not look. */
declare module 'cephes' {
  const cephes: {
    /** Resolves once the functions may be called. */
    readonly compiled: Promise<void>;
    /** Bessel function of the first kind, of whole order n. */
    jn(n: number, x: number): number;
    /** Normal distribution function. */
    ndtr(x: number): number;
  };

  // biome-ignore lint/style/noDefaultExport: it is what the library exports
  export default cephes;
}
