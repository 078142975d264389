/**
 * Numbers for people. Stored numbers stay raw; only here are they rounded, given their unit, and a
 * value cut to what its uncertainty supports.
 */

/** What stands where there is no value. */
export const noValue = '–';

const shownUnits: Readonly<Record<string, string>> = {
  'cm-1': 'cm⁻¹',
  um: 'µm',
  angstrom: 'Å',
  percent: '%',
  degrees: '°',
  px: 'px',
};

/** A unit of maps and recipes as it is shown: "cm-1" → "cm⁻¹"; others unchanged. */
export function formatUnit(unit: string): string {
  return shownUnits[unit] ?? unit;
}

/** A number that is already text, with its unit; degrees stand close, everything else after a space. */
export function withUnit(text: string, unit: string): string {
  if (unit === '' || text === noValue) return text;
  return unit === 'degrees' ? `${text}°` : `${text} ${formatUnit(unit)}`;
}

/**
 * A number to so many significant digits: plain from 0.0001 to 9 999 999, with a power of ten beyond.
 * Trailing zeros are kept, since they are significant; a true minus sign is used.
 */
export function formatSignificant(value: number, digits: number): string {
  if (Number.isNaN(value)) return noValue;
  if (!Number.isFinite(value)) return value > 0 ? '∞' : '−∞';
  if (value === 0) return '0';
  const exponent = decimalExponent(value, digits);
  if (exponent < -4 || exponent > 6) {
    const mantissa = value.toExponential(digits - 1).split('e')[0];
    return `${withMinus(mantissa)}×${powerOfTen(exponent)}`;
  }
  return fixed(value, digits - 1 - exponent);
}

/**
 * A value with its 1-σ uncertainty and unit: "2.0124 ± 0.0011 eV". The uncertainty has two
 * significant digits and the value as many decimals. Without a usable uncertainty (null, zero,
 * negative, not finite) the value stands alone with five digits.
 */
export function formatMeasured(value: number, uncertainty: number | null, unit: string): string {
  if (!Number.isFinite(value)) return formatSignificant(value, 5);
  if (uncertainty === null || !Number.isFinite(uncertainty) || uncertainty <= 0) {
    return withUnit(formatSignificant(value, 5), unit);
  }
  const errorExponent = decimalExponent(uncertainty, 2);
  const leading = Math.max(value === 0 ? errorExponent : decimalExponent(value, 15), errorExponent);
  if (leading < -4 || leading > 6) {
    const scale = Number(`1e${-leading}`);
    const decimals = 1 - (errorExponent - leading);
    const pair = `${fixed(value * scale, decimals)} ± ${fixed(uncertainty * scale, decimals)}`;
    return withUnit(`(${pair})×${powerOfTen(leading)}`, unit);
  }
  const decimals = 1 - errorExponent;
  const pair = `${fixed(value, decimals)} ± ${fixed(uncertainty, decimals)}`;
  return unit === 'degrees' ? `${pair}°` : withUnit(pair, unit);
}

/** A length with the unit that keeps its digits few: 0.32 nm, 15 nm, 1.5 µm, 2.25 mm. */
export function formatLength(lengthNm: number): string {
  const size = Math.abs(lengthNm);
  if (!Number.isFinite(lengthNm)) return formatSignificant(lengthNm, 3);
  if (size >= 999_500) return `${trimmed(lengthNm / 1e6)} mm`;
  if (size >= 999.5) return `${trimmed(lengthNm / 1000)} µm`;
  return `${trimmed(lengthNm)} nm`;
}

/** Counts in few letters: 950, 1.2k, 57k, 1.2M, 3.4G; fractions below ten keep two digits. */
export function formatCount(counts: number): string {
  if (!Number.isFinite(counts)) return formatSignificant(counts, 2);
  const size = Math.abs(counts);
  if (size < 9.95) return trimmed(counts, 2);
  if (size < 999.5) return fixed(counts, 0);
  const steps = [
    [1e3, 'k'],
    [1e6, 'M'],
    [1e9, 'G'],
  ] as const;
  for (const [unit, letter] of steps) {
    const scaled = size / unit;
    if (scaled < 9.95) return `${fixed(counts / unit, 1)}${letter}`;
    if (scaled < 999.5) return `${fixed(counts / unit, 0)}${letter}`;
  }
  return formatSignificant(counts, 2);
}

/** Photon energy in eV to 0.1 meV, or as many digits as the step between channels calls for. */
export function formatEnergy(energyEv: number, stepEv = 1e-3): string {
  if (!Number.isFinite(energyEv)) return noValue;
  const decimals = Math.min(Math.max(1 - decimalExponent(stepEv, 1), 2), 7);
  return `${fixed(energyEv, decimals)} eV`;
}

/** Three significant digits at most, without trailing zeros: 0.5, 15, 1.25. */
function trimmed(value: number, digits = 3): string {
  return withMinus(String(Number(value.toPrecision(digits))));
}

/** Power of ten of the first digit, after rounding to `digits`: 9.96 to two digits counts as 10. */
function decimalExponent(value: number, digits: number): number {
  return Number(value.toExponential(digits - 1).split('e')[1]);
}

/** `decimals` may be negative: −1 rounds to tens. A zero never shows a minus sign. */
function fixed(value: number, decimals: number): string {
  if (decimals >= 0) return withMinus(value.toFixed(Math.min(decimals, 20)));
  const unit = Number(`1e${-decimals}`);
  return withMinus(String(Math.round(value / unit) * unit));
}

function withMinus(text: string): string {
  if (!text.startsWith('-')) return text;
  return Number(text) === 0 ? text.slice(1) : `−${text.slice(1)}`;
}

function powerOfTen(exponent: number): string {
  const digits = '⁰¹²³⁴⁵⁶⁷⁸⁹';
  const text = String(Math.abs(exponent)).replace(/\d/g, (digit) => digits[Number(digit)]);
  return `10${exponent < 0 ? '⁻' : ''}${text}`;
}
