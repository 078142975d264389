/** The commands: their words, and where their code is; it is loaded when the command is called. */
import type { CommandSpec, RunCommand } from './command';

export interface Command extends CommandSpec {
  readonly load: () => Promise<RunCommand>;
}

const recipeOption = {
  value: 'R',
  help: 'recipe (.json); its scan block says how the scan is read',
};

export const commands: readonly Command[] = [
  {
    name: 'inspect',
    usage: 'inspect SCAN [--recipe R] [--json]',
    summary: 'shows what a scan file holds, what was guessed and why',
    details: [
      'Shape, axes and units of the scan, each guess with its evidence and what could be',
      'meant instead, statistics of the counts, and warnings.',
    ],
    options: {
      recipe: recipeOption,
      json: { value: null, help: 'print JSON for other programs' },
    },
    operands: { noun: 'the scan file', least: 1, most: 1 },
    load: async () => (await import('./inspect')).runInspect,
  },
  {
    name: 'run',
    usage: 'run --recipe R --out DIR [--workers N] [--only PARTS] SCAN…',
    summary: 'replays a recipe on one scan or many and writes the results',
    details: [
      'Writes a folder DIR/STEM for each scan, STEM being the name of its file without the',
      'ending: maps/NAME.npy, maps.h5, pixels.csv, summary.json and blend.png. A file is',
      'complete or absent. Numbers do not depend on the number of workers.',
    ],
    options: {
      recipe: { value: 'R', help: 'recipe (.json) to replay' },
      out: { value: 'DIR', help: 'folder the results go to; made where it is missing' },
      workers: { value: 'N', help: 'number of workers; as many as processor cores if left out' },
      only: {
        value: 'PARTS',
        help: 'write these parts only: maps, h5, pixels, summary, blend; with commas',
      },
    },
    operands: { noun: 'the scan file', least: 1, most: Number.POSITIVE_INFINITY },
    load: async () => (await import('./run')).runRun,
  },
  {
    name: 'check',
    usage: 'check RECIPE',
    summary: 'validates a recipe',
    details: [
      'Lists everything that is wrong with a recipe, each with its place, or says it is right.',
    ],
    options: {},
    operands: { noun: 'the recipe', least: 1, most: 1 },
    load: async () => (await import('./check')).runCheck,
  },
  {
    name: 'sample',
    usage: 'sample NAME --out FILE [--seed N] [--size WxH]',
    summary: 'writes a demo scan and, beside it, its truth',
    details: [
      'NAME is tent-field or twin-layer. The ending of FILE chooses the format: .h5, .npz or',
      '.npy. The same name, seed and size always give the same counts.',
    ],
    options: {
      out: { value: 'FILE', help: 'file to write' },
      seed: { value: 'N', help: 'whole number that all its chance comes from; 1 if left out' },
      size: { value: 'WxH', help: 'columns x rows; 64x64 if left out' },
    },
    operands: { noun: 'the name of a demo scan', least: 1, most: 1 },
    load: async () => (await import('./sample')).runSample,
  },
  {
    name: 'serve',
    usage: 'serve [SCAN] [--recipe R] [--port P]',
    summary: 'serves the app on this machine, opening SCAN if given',
    details: [
      'The app is served on 127.0.0.1 to browsers of this machine only, until Ctrl-C. Without',
      'SCAN it opens the demo scan.',
    ],
    options: {
      recipe: { value: 'R', help: 'recipe (.json) to open the scan with' },
      port: { value: 'P', help: 'port to listen on; a free one from 4310 on if left out' },
    },
    operands: { noun: 'the scan file', least: 0, most: 1 },
    load: async () => (await import('./serve')).runServe,
  },
];
