/** The words of the command line are a public contract: help, exit codes and the form of errors are pinned. */
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { version } from '../../package.json';
import { commands } from '../../src/cli/commands';
import { exitCodeOf } from '../../src/cli/exit-codes';
import { call } from './call';

let folder = '';

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rimlight-main-'));
});
afterAll(() => rm(folder, { recursive: true }));

async function recipeFile(name: string, text: string): Promise<string> {
  const path = join(folder, name);
  await writeFile(path, text);
  return path;
}

describe('help', () => {
  it('of the program is as pinned', async () => {
    const { code, out, err } = await call('--help');
    expect([code, err]).toEqual([0, []]);
    expect(out.join('\n')).toMatchInlineSnapshot(`
      "Rimlight: explore hyperspectral near-field luminescence and Raman maps

      Usage: rimlight COMMAND …

        inspect  shows what a scan file holds, what was guessed and why
        run      replays a recipe on one scan or many and writes the results
        check    validates a recipe
        sample   writes a demo scan and, beside it, its truth
        serve    serves the app on this machine, opening SCAN if given

        --help     print this, or after a command what it takes
        --version  print the version

      Exit codes: 0 done; 1 a fault of the program; 2 wrong usage or recipe; 3 a scan that
      cannot be read; 4 several scans, of which some failed and the others are done."
    `);
  });

  it.each(commands.map(({ name }) => name))('of %s is as pinned', async (name) => {
    const { code, out, err } = await call(name, '--help');
    expect([code, err]).toEqual([0, []]);
    expect(out.join('\n')).toMatchSnapshot();
  });

  it('fits a terminal of 100 columns', async () => {
    const texts = [await call('--help')];
    for (const { name } of commands) texts.push(await call(name, '--help'));
    const widest = Math.max(...texts.flatMap(({ out }) => out.map((line) => line.length)));
    expect(widest).toBeLessThanOrEqual(100);
  });

  it('is given whatever else is missing', async () => {
    expect((await call('run', '--help')).code).toBe(0);
    expect((await call('sample', 'nothing', '--help')).code).toBe(0);
  });

  it('gives the version', async () => {
    expect(await call('--version')).toEqual({ code: 0, out: [version], err: [] });
  });
});

describe('a wrong call', () => {
  it.each([
    [
      [],
      'rimlight: a command is missing. Give one of inspect, run, check, sample, serve, or see `rimlight --help`.',
    ],
    [
      ['inspct'],
      'rimlight: there is no command "inspct". Did you mean "inspect"? See `rimlight --help`.',
    ],
    [
      ['inspect'],
      'rimlight: the scan file is missing (rimlight inspect). Use it as: rimlight inspect SCAN [--recipe R] [--json]',
    ],
    [
      ['check', 'a', 'b'],
      'rimlight: "b" is one word too many (rimlight check). Use it as: rimlight check RECIPE',
    ],
    [
      ['inspect', 'a.h5', '--jsn'],
      'rimlight: there is no option --jsn (rimlight inspect). Did you mean --json? See `rimlight inspect --help`.',
    ],
    [
      ['inspect', 'a.h5', '-x'],
      'rimlight: there is no option -x (rimlight inspect). See `rimlight inspect --help`.',
    ],
    [
      ['inspect', 'a.h5', '--json', '--json'],
      'rimlight: the option --json is given twice (rimlight inspect). Use it as: rimlight inspect SCAN [--recipe R] [--json]',
    ],
    [
      ['inspect', 'a.h5', '--json=yes'],
      'rimlight: the option --json takes no value (rimlight inspect). Use it as: rimlight inspect SCAN [--recipe R] [--json]',
    ],
    [
      ['inspect', 'a.h5', '--recipe'],
      'rimlight: the option --recipe needs a value, R (rimlight inspect). Use it as: rimlight inspect SCAN [--recipe R] [--json]',
    ],
    [
      ['inspect', '--recipe', '--json', 'a.h5'],
      'rimlight: the option --recipe needs a value, R (rimlight inspect). Use it as: rimlight inspect SCAN [--recipe R] [--json]',
    ],
    [
      ['serve', '--port', '99999'],
      'rimlight: --port is "99999" (rimlight serve). Give a whole number from 0 to 65535.',
    ],
    [
      ['serve', '--recipe', 'r.json'],
      'rimlight: a recipe is given without a scan (rimlight serve). Give the scan as well.',
    ],
    [
      ['inspect', 'constructor', '--constructor'],
      'rimlight: there is no option --constructor (rimlight inspect). See `rimlight inspect --help`.',
    ],
  ])('%j ends with 2 and one line', async (words, line) => {
    expect(await call(...words)).toEqual({ code: 2, out: [], err: [line] });
  });

  it('shows where it came from with --debug only', async () => {
    const { code, err } = await call('inspect', '--debug');
    expect(code).toBe(2);
    expect(err.length).toBeGreaterThan(1);
    expect(err.join('\n')).toMatch(/\n\s+at /);
  });
});

describe('a wrong call of run', () => {
  it.each([
    [['--out', 'o', 'a.h5'], '--recipe is missing'],
    [['--recipe', 'r.json', 'a.h5'], '--out is missing'],
    [['--recipe', 'r.json', '--out', 'o'], 'the scan file is missing'],
    [['--recipe', 'r.json', '--out', 'o', '--workers', '0', 'a.h5'], '--workers is "0"'],
    [
      ['--recipe', 'r.json', '--out', 'o', '--only', 'mapps', 'a.h5'],
      'there is no part "mapps" to write',
    ],
    [
      ['--recipe', 'r.json', '--out', 'o', '--only', 'maps,fit', 'a.h5'],
      'this build cannot make "fit" yet',
    ],
    [['--recipe', 'r.json', '--out', 'o', 'a.h5', 'a.h5'], 'a.h5 is given twice'],
    [['--recipe', 'nowhere.json', '--out', 'o', 'a.h5'], 'the recipe cannot be read'],
  ])('%j ends with 2 before anything is read', async (words, what) => {
    const { code, out, err } = await call('run', ...words);
    expect([code, out, err.length]).toEqual([2, [], 1]);
    expect(err[0]).toContain(`rimlight: ${what}`);
  });
});

describe('exit codes', () => {
  it('are those of the contract', () => {
    expect(['fault', 'usage', 'recipe', 'scan'].map((kind) => exitCodeOf(kind as 'fault'))).toEqual(
      [1, 2, 2, 3],
    );
  });
});

describe('check', () => {
  it('says that a recipe is right', async () => {
    const path = await recipeFile('right.json', '{ "recipe": 1, "title": "a" }');
    expect(await call('check', path)).toEqual({
      code: 0,
      out: [`${path} is a valid recipe of format 1.`],
      err: [],
    });
  });

  it('says what a right recipe asks for that cannot be run yet', async () => {
    const text = '{ "recipe": 1, "condition": [ { "step": "despike" } ] }';
    const { code, out } = await call('check', await recipeFile('later.json', text));
    expect(code).toBe(0);
    expect(out.slice(1)).toEqual(['This build cannot run the despike step yet (condition[0]).']);
  });

  it('lists every problem with its place, and ends with 2', async () => {
    const path = await recipeFile(
      'wrong.json',
      '{\n  "recipe": 1,\n  "bands": [ { "name": "a", "from": 1, "to": 2, "unit": "ev" } ],\n  "blendd": {}\n}',
    );
    const { code, out, err } = await call('check', path);
    expect(code).toBe(2);
    expect(out).toHaveLength(2);
    expect(out[0]).toMatch(/^bands\[0\]\.unit, line 3, column \d+: .*"eV"/);
    expect(err).toHaveLength(1);
    expect(err[0]).toMatch(
      /^rimlight: .+, and 1 more problem \(.*wrong\.json: bands\[0\]\.unit, .+\)\. .+\.$|\?$/,
    );
  });

  it('ends with 2 when there is no such file, or none that is text', async () => {
    const path = join(folder, 'nowhere.json');
    expect(await call('check', path)).toEqual({
      code: 2,
      out: [],
      err: [
        `rimlight: the recipe cannot be read: there is no such file (${path}). Check the path.`,
      ],
    });
    expect((await call('check', folder)).err[0]).toContain('it is a folder');
    const binary = join(folder, 'binary.json');
    await writeFile(binary, Uint8Array.of(0x89, 0x48, 0x44, 0x46, 0, 0));
    expect((await call('check', binary)).code).toBe(2);
  });
});
