/** The words after a command, taken apart and held against what the command knows. */
import { parseArgs } from 'node:util';
import { RimlightError } from '../errors';
import { nearestWord } from '../recipe/nearest';
import type { Call, CommandSpec, OptionSpec } from './command';

/** Options every command has. */
export const commonOptions: Readonly<Record<string, OptionSpec>> = {
  debug: { value: null, help: 'print the stack trace of an error' },
  help: { value: null, help: 'print this' },
};

/**
 * Takes a command's words apart. Options may stand anywhere; after `--` everything is an operand.
 *
 * @throws RimlightError 'usage' - for an unknown or repeated option, a value missing or too much, too few or too many operands
 */
export function parseCall(spec: CommandSpec, words: readonly string[]): Call {
  const known = { ...spec.options, ...commonOptions };
  const { tokens } = parseArgs({
    args: [...words],
    options: Object.fromEntries(
      Object.entries(known).map(([name, { value }]) => [
        name,
        { type: value === null ? ('boolean' as const) : ('string' as const) },
      ]),
    ),
    strict: false,
    allowPositionals: true,
    tokens: true,
  });
  const operands: string[] = [];
  const options = new Map<string, string>();
  for (const token of tokens) {
    if (token.kind === 'positional') operands.push(token.value);
    if (token.kind !== 'option') continue;
    const option = Object.hasOwn(known, token.name) ? known[token.name] : undefined;
    if (option === undefined) throw unknownOption(spec, token.rawName, Object.keys(known));
    if (options.has(token.name)) {
      throw wrongCall(spec, `the option --${token.name} is given twice`);
    }
    options.set(token.name, optionValue(spec, option, token));
  }
  if (!options.has('help')) assertOperands(spec, operands);
  return { spec, operands, options };
}

interface OptionToken {
  readonly name: string;
  readonly value?: string | undefined;
  readonly inlineValue?: boolean | undefined;
}

function optionValue(spec: CommandSpec, option: OptionSpec, token: OptionToken): string {
  const { name, value, inlineValue = false } = token;
  if (option.value === null) {
    if (value === undefined) return '';
    throw wrongCall(spec, `the option --${name} takes no value`);
  }
  // A following word that looks like an option is a value forgotten, unless it is tied on with "=".
  const isForgotten =
    value === undefined || value === '' || (value.startsWith('-') && !inlineValue);
  if (isForgotten) throw wrongCall(spec, `the option --${name} needs a value, ${option.value}`);
  return value;
}

function assertOperands(spec: CommandSpec, operands: readonly string[]): void {
  const { noun, least, most } = spec.operands;
  const extra = operands[most];
  if (operands.length < least) throw wrongCall(spec, `${noun} is missing`);
  if (extra !== undefined) throw wrongCall(spec, `"${extra}" is one word too many`);
}

function unknownOption(
  spec: CommandSpec,
  rawName: string,
  names: readonly string[],
): RimlightError {
  const nearest = nearestWord(rawName.replace(/^-+/, ''), names);
  return new RimlightError('usage', {
    what: `there is no option ${rawName}`,
    where: `rimlight ${spec.name}`,
    hint:
      nearest === null
        ? `See \`rimlight ${spec.name} --help\`.`
        : `Did you mean --${nearest}? See \`rimlight ${spec.name} --help\`.`,
  });
}

/** A call that cannot be understood or carried out as written. */
export function wrongCall(
  spec: CommandSpec,
  what: string,
  hint = `Use it as: rimlight ${spec.usage}`,
): RimlightError {
  return new RimlightError('usage', { what, where: `rimlight ${spec.name}`, hint });
}

/** A whole number of an option, within bounds; null where the option is not given. */
export function wholeNumberOption(
  { spec, options }: Call,
  name: string,
  { least, most }: { readonly least: number; readonly most: number },
): number | null {
  const text = options.get(name);
  if (text === undefined) return null;
  const value = Number(text);
  if (/^\d+$/.test(text) && value >= least && value <= most) return value;
  throw wrongCall(spec, `--${name} is "${text}"`, `Give a whole number from ${least} to ${most}.`);
}
