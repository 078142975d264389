/** Calls the command line inside this process and keeps what it says. */
import type { Context } from '../../src/cli/command';
import { main } from '../../src/cli/main';

export interface Outcome {
  readonly code: number;
  /** lines of standard output and of standard error */
  readonly out: readonly string[];
  readonly err: readonly string[];
}

export async function call(...words: readonly string[]): Promise<Outcome> {
  const out: string[] = [];
  const err: string[] = [];
  const context: Context = {
    print: (text) => out.push(...text.split('\n')),
    say: (text) => err.push(...text.split('\n')),
    progressLine: null,
    signal: new AbortController().signal,
  };
  return { code: await main(words, context), out, err };
}
