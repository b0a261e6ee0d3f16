/**
 * Arithmetic on truncated Taylor series ("jets"): row `r` of the work array holds the coefficients
 * x₀ … x₅ of x(τ) = Σ xₖτᵏ, k-th derivative over k!. The recurrences are those of automatic
 * differentiation in Taylor mode (A. Griewank, A. Walther, "Evaluating Derivatives", 2nd ed.,
 * 2008, chapter 13, doi:10.1137/1.9780898717761).
 */

/** Coefficients in a jet. */
export const jetLength = 6;

/** A function of one jet: reads row `a`, writes row `to`. */
export type UnaryJet = (w: Float64Array, to: number, a: number) => void;

/** A function of two jets. */
export type BinaryJet = (w: Float64Array, to: number, a: number, b: number) => void;

export const addJets: BinaryJet = (w, to, a, b) => {
  for (let k = 0; k < jetLength; k++) w[to + k] = w[a + k]! + w[b + k]!;
};

export const subJets: BinaryJet = (w, to, a, b) => {
  for (let k = 0; k < jetLength; k++) w[to + k] = w[a + k]! - w[b + k]!;
};

export const mulJets: BinaryJet = (w, to, a, b) => {
  for (let k = 0; k < jetLength; k++) {
    let sum = 0;
    for (let j = 0; j <= k; j++) sum += w[a + j]! * w[b + k - j]!;
    w[to + k] = sum;
  }
};

export const divJets: BinaryJet = (w, to, a, b) => {
  for (let k = 0; k < jetLength; k++) {
    let sum = w[a + k]!;
    for (let j = 0; j < k; j++) sum -= w[to + j]! * w[b + k - j]!;
    w[to + k] = sum / w[b]!;
  }
};

export const negJet: UnaryJet = (w, to, a) => {
  for (let k = 0; k < jetLength; k++) w[to + k] = -w[a + k]!;
};

export const copyJet: UnaryJet = (w, to, a) => {
  for (let k = 0; k < jetLength; k++) w[to + k] = w[a + k]!;
};

export const sqrtJet: UnaryJet = (w, to, a) => {
  const root = Math.sqrt(w[a]!);
  w[to] = root;
  for (let k = 1; k < jetLength; k++) {
    let sum = w[a + k]!;
    for (let j = 1; j < k; j++) sum -= w[to + j]! * w[to + k - j]!;
    w[to + k] = sum / (2 * root);
  }
};

/** y = e^{rate·x}, from y′ = rate·x′·y. */
function exponential(w: Float64Array, to: number, a: number, rate: number): void {
  w[to] = rate === 1 ? Math.exp(w[a]!) : 2 ** w[a]!;
  for (let k = 1; k < jetLength; k++) {
    let sum = 0;
    for (let j = 1; j <= k; j++) sum += j * w[a + j]! * w[to + k - j]!;
    w[to + k] = (rate * sum) / k;
  }
}

export const expJet: UnaryJet = (w, to, a) => exponential(w, to, a, 1);

export const exp2Jet: UnaryJet = (w, to, a) => exponential(w, to, a, Math.LN2);

/** y = ln x, from x·y′ = x′. */
export const logJet: UnaryJet = (w, to, a) => {
  w[to] = Math.log(w[a]!);
  for (let k = 1; k < jetLength; k++) {
    let sum = k * w[a + k]!;
    for (let j = 1; j < k; j++) sum -= j * w[to + j]! * w[a + k - j]!;
    w[to + k] = sum / (k * w[a]!);
  }
};

const cosine = new Float64Array(jetLength);

/** Sine and cosine together: s′ = x′·c, c′ = −x′·s; `turned` writes the cosine instead. */
function circular(w: Float64Array, to: number, a: number, turned: boolean): void {
  const sine = w.subarray(to, to + jetLength);
  const [s, c] = turned ? [cosine, sine] : [sine, cosine];
  s[0] = Math.sin(w[a]!);
  c[0] = Math.cos(w[a]!);
  for (let k = 1; k < jetLength; k++) {
    let rise = 0;
    let fall = 0;
    for (let j = 1; j <= k; j++) {
      rise += j * w[a + j]! * c[k - j]!;
      fall += j * w[a + j]! * s[k - j]!;
    }
    s[k] = rise / k;
    c[k] = -fall / k;
  }
}

export const sinJet: UnaryJet = (w, to, a) => circular(w, to, a, false);

export const cosJet: UnaryJet = (w, to, a) => circular(w, to, a, true);

const remainder = new Float64Array(jetLength);

/** y = tanh x, from y′ = (1 − y²)·x′. */
export const tanhJet: UnaryJet = (w, to, a) => {
  w[to] = Math.tanh(w[a]!);
  remainder[0] = 1 - w[to]! * w[to]!;
  for (let k = 1; k < jetLength; k++) {
    let sum = 0;
    for (let j = 1; j <= k; j++) sum += j * w[a + j]! * remainder[k - j]!;
    w[to + k] = sum / k;
    let square = 0;
    for (let j = 0; j <= k; j++) square += w[to + j]! * w[to + k - j]!;
    remainder[k] = -square;
  }
};

/** A value nearer to zero than its jet carries it in this share of a sample counts as zero. */
const near = 1e-9;

/**
 * Sign of a jet just before (`side` −1) or just after (`side` 1) its point: of the value, or where
 * that is zero of the first coefficient that is not.
 */
export function signOfJet(w: Float64Array, a: number, side: -1 | 1): -1 | 0 | 1 {
  const value = w[a]!;
  let reach = 0;
  for (let k = 1; k < jetLength; k++) reach = Math.max(reach, Math.abs(w[a + k]!));
  if (Math.abs(value) > near * reach) return value > 0 ? 1 : -1;
  let turn: number = side;
  for (let k = 1; k < jetLength; k++) {
    const coefficient = w[a + k]!;
    if (Math.abs(coefficient) > near * reach) return coefficient * turn > 0 ? 1 : -1;
    turn *= side;
  }
  return 0;
}
