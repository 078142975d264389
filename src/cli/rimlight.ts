#!/usr/bin/env node
/** The program: hands its words to the commands, its two outputs and the user's wish to stop. */
import { main } from './main';

const stopper = new AbortController();
let isListening = false;
let hasProgressLine = false;

for (const stream of [process.stdout, process.stderr]) {
  // Whoever read our output has gone (`rimlight inspect … | head`): nothing is wrong, nothing is left to say.
  stream.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code === 'EPIPE') process.exit(0);
    throw error;
  });
}

/** A command that does not look at the signal is ended by the system at once, as any program is. */
function listenToStop(): AbortSignal {
  if (isListening) return stopper.signal;
  isListening = true;
  for (const name of ['SIGINT', 'SIGTERM'] as const) {
    process.on(name, () => {
      // Asked twice, it does not wait for anything to be put away.
      if (stopper.signal.aborted) process.exit(130);
      stopper.abort();
    });
  }
  return stopper.signal;
}

process.exitCode = await main(process.argv.slice(2), {
  print: (text) => process.stdout.write(`${text}\n`),
  say: (text) => {
    clearProgressLine();
    process.stderr.write(`${text}\n`);
  },
  progressLine: process.stderr.isTTY ? writeProgressLine : null,
  get signal() {
    return listenToStop();
  },
});
clearProgressLine();

function writeProgressLine(text: string): void {
  clearProgressLine();
  process.stderr.write(text.slice(0, (process.stderr.columns || 80) - 1));
  hasProgressLine = true;
}

function clearProgressLine(): void {
  if (hasProgressLine) process.stderr.write('\r\x1b[K');
  hasProgressLine = false;
}
