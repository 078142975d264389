/** Help texts, made from the commands' own words. */
import type { CommandSpec, OptionSpec } from './command';
import { commonOptions } from './options';

/** Help of the whole program. */
export function programHelp(commands: readonly CommandSpec[]): string {
  return [
    'Rimlight: explore hyperspectral near-field luminescence and Raman maps',
    '',
    'Usage: rimlight COMMAND …',
    '',
    ...columns(commands.map(({ name, summary }) => [name, summary])),
    '',
    ...columns([
      ['--help', 'print this, or after a command what it takes'],
      ['--version', 'print the version'],
    ]),
    '',
    'Exit codes: 0 done; 1 a fault of the program; 2 wrong usage or recipe; 3 a scan that',
    'cannot be read; 4 several scans, of which some failed and the others are done.',
  ].join('\n');
}

/** Help of one command. */
export function commandHelp(spec: CommandSpec): string {
  const options = Object.entries({ ...spec.options, ...commonOptions });
  return [
    `Usage: rimlight ${spec.usage}`,
    '',
    ...spec.details,
    '',
    ...columns(options.map(([name, option]) => [optionText(name, option), option.help])),
  ].join('\n');
}

function optionText(name: string, { value }: OptionSpec): string {
  return value === null ? `--${name}` : `--${name} ${value}`;
}

/** Two columns, the first as wide as its longest entry. */
function columns(rows: readonly (readonly [string, string])[]): readonly string[] {
  const width = Math.max(...rows.map(([left]) => left.length));
  return rows.map(([left, right]) => `  ${left.padEnd(width)}  ${right}`);
}
