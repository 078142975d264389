/** `rimlight sample`: a demo scan, and beside it everything that went into it. */
import { basename, dirname, join } from 'node:path';
import { encodeSample, sampleFormat } from '../io/sample-file';
import { defaultScenarioOptions, generateScenario } from '../science/scenarios/scenario';
import type { Call, RunCommand } from './command';
import { done } from './exit-codes';
import { wholeNumberOption, wrongCall } from './options';
import { startProgress } from './progress';
import { ensureFolder, writeAtomically } from './write-atomic';

export const runSample: RunCommand = async (call, context) => {
  const [name = ''] = call.operands;
  const out = call.options.get('out');
  if (out === undefined) throw wrongCall(call.spec, '--out is missing');
  // Asked before the scan is made, which may take minutes.
  sampleFormat(basename(out));
  const { nx, ny } = sizeOf(call);
  const seed = wholeNumberOption(call, 'seed', { least: 0, most: Number.MAX_SAFE_INTEGER });
  const scan = generateScenario(
    name,
    { nx, ny, seed: seed ?? defaultScenarioOptions.seed },
    startProgress(context, `Making ${name}`),
  );
  const files = await encodeSample(scan, basename(out), {
    signal: context.signal,
    onProgress: startProgress(context, `Encoding ${basename(out)}`),
  });
  await ensureFolder(dirname(out));
  // The scan last: where it is, its truth is too.
  for (const { name: fileName, bytes } of [...files].reverse()) {
    await writeAtomically(join(dirname(out), fileName), bytes, context.signal);
  }
  const written = files.map(({ name: fileName }) => join(dirname(out), fileName)).join(', ');
  context.print(`${written}: ${nx} × ${ny} pixels, ${scan.shape.nk} channels, seed ${scan.seed}`);
  return done;
};

function sizeOf({ spec, options }: Call): { readonly nx: number; readonly ny: number } {
  const text = options.get('size');
  if (text === undefined) return defaultScenarioOptions;
  const match = /^(\d{1,5})\s*[x×]\s*(\d{1,5})$/i.exec(text);
  if (match === null) {
    throw wrongCall(spec, `--size is "${text}"`, 'Give columns x rows, such as 128x96.');
  }
  return { nx: Number(match[1]), ny: Number(match[2]) };
}
