/** Linear scaling that keeps decimal fractions exact: 3 × 0.1 is 0.3. */

export type Scaling = { readonly gradient: number; readonly offset: number };

const MAX_DECIMALS = 12;

/**
 * physical = raw × gradient + offset, correctly rounded where both factors are decimal fractions (as in every IODD) and
 * the sum stays below 2⁵³ in units of their last decimal; plain floating point otherwise.
 */
export function makeScaler(scaling: Scaling): (raw: number) => number {
  const { gradient, offset } = scaling;
  if (gradient === 1 && offset === 0) return (raw) => raw;
  const decimals = Math.max(countDecimals(gradient), countDecimals(offset));
  if (decimals > MAX_DECIMALS) return (raw) => raw * gradient + offset;
  const divisor = 10 ** decimals;
  const factor = Math.round(gradient * divisor);
  const addend = Math.round(offset * divisor);
  return (raw) => {
    const numerator = raw * factor + addend;
    return Number.isSafeInteger(numerator) ? numerator / divisor : raw * gradient + offset;
  };
}

/** raw = round((physical − offset) / gradient). */
export function unscale(physical: number, scaling: Scaling): number {
  return Math.round((physical - scaling.offset) / scaling.gradient);
}

function countDecimals(value: number): number {
  for (let decimals = 0; decimals <= MAX_DECIMALS; decimals++) {
    const scaled = value * 10 ** decimals;
    if (Math.abs(scaled - Math.round(scaled)) < 1e-9 * Math.max(1, Math.abs(scaled))) return decimals;
  }
  return MAX_DECIMALS + 1;
}
