/** What is typed into a field for a number, as a number. */

export type NumberRule = 'any' | 'positive' | 'not negative' | 'at least one';

const decimal = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;

/**
 * A comma stands for the decimal point, as in half of the world's laboratories: nobody groups the
 * digits of a wavelength.
 *
 * @returns null for what is no number, or none that the rule admits
 */
export function enteredNumber(text: string, rule: NumberRule): number | null {
  const plain = text.trim().replace('−', '-').replace(',', '.');
  if (!decimal.test(plain)) return null;
  const value = Number(plain);
  if (!Number.isFinite(value)) return null;
  return keeps[rule](value) ? value : null;
}

const keeps: Readonly<Record<NumberRule, (value: number) => boolean>> = {
  any: () => true,
  positive: (value) => value > 0,
  'not negative': (value) => value >= 0,
  'at least one': (value) => value >= 1,
};

const ruleWords: Readonly<Record<NumberRule, string>> = {
  any: 'A number',
  positive: 'A number above 0',
  'not negative': 'A number not below 0',
  'at least one': 'A number not below 1',
};

export function numberRuleInWords(rule: NumberRule): string {
  return ruleWords[rule];
}
