/** From the words of a call to its exit code: finds the command, runs it, tells its error in one line. */
import { inspect } from 'node:util';
import { version } from '../../package.json';
import { ensureRimlightError, RimlightError } from '../errors';
import { nearestWord } from '../recipe/nearest';
import type { Context } from './command';
import { type Command, commands } from './commands';
import { errorLine } from './error-line';
import { done, exitCodeOf } from './exit-codes';
import { commandHelp, programHelp } from './help';
import { parseCall } from './options';

/** @param words - what stands after the program's name */
export async function main(words: readonly string[], context: Context): Promise<number> {
  try {
    return await dispatch(words, context);
  } catch (thrown) {
    const error = ensureRimlightError(thrown);
    context.say(errorLine(error));
    if (isDebug(words)) context.say(inspect(thrown));
    return exitCodeOf(error.kind);
  }
}

async function dispatch(words: readonly string[], context: Context): Promise<number> {
  const [first, ...rest] = words;
  if (first === '--version') {
    context.print(version);
    return done;
  }
  if (first === '--help' || first === 'help') {
    context.print(programHelp(commands));
    return done;
  }
  const command = ensureCommand(first);
  const call = parseCall(command, rest);
  if (call.options.has('help')) {
    context.print(commandHelp(command));
    return done;
  }
  const run = await command.load();
  return run(call, context);
}

function ensureCommand(word: string | undefined): Command {
  const found = commands.find(({ name }) => name === word);
  if (found !== undefined) return found;
  const names = commands.map(({ name }) => name);
  const nearest = word === undefined ? null : nearestWord(word, names);
  throw new RimlightError('usage', {
    what: word === undefined ? 'a command is missing' : `there is no command "${word}"`,
    where: '',
    hint:
      nearest === null
        ? `Give one of ${names.join(', ')}, or see \`rimlight --help\`.`
        : `Did you mean "${nearest}"? See \`rimlight --help\`.`,
  });
}

/** Looked for before the call is understood: a call that is not is an error too. */
function isDebug(words: readonly string[]): boolean {
  const end = words.indexOf('--');
  return words.slice(0, end < 0 ? words.length : end).includes('--debug');
}
