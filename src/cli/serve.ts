/** `rimlight serve`: the app on loopback, opening a scan if one is given. */
import { stat } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import { RimlightError } from '../errors';
import type { Call, RunCommand } from './command';
import { done } from './exit-codes';
import { wholeNumberOption, wrongCall } from './options';
import { findCompanions, findScan, readRecipeFile } from './recipe-file';
import { appFileAt } from './server/app-files';
import { createAppServer, listenOnLoopback } from './server/app-server';
import { type Offer, offerDemo, offerScan } from './server/offer';

export const runServe: RunCommand = async (call, { print, signal }) => {
  const port = wholeNumberOption(call, 'port', { least: 0, most: 65_535 });
  const appFolder = fileURLToPath(new URL('../app', import.meta.url));
  const offer = await offerOf(call, appFolder);
  if ((await appFileAt(appFolder, '/')) === null) throw appMissing(appFolder);
  const server = createAppServer({ appFolder, offer });
  const listening = await listenOnLoopback(server, port);
  print(`Rimlight is at http://127.0.0.1:${listening}/ (Ctrl-C ends it)`);
  await new Promise<void>((resolve) => {
    const close = (): void => {
      server.close(() => resolve());
      server.closeAllConnections();
    };
    if (signal.aborted) close();
    else signal.addEventListener('abort', close, { once: true });
  });
  return done;
};

async function offerOf({ spec, operands, options }: Call, appFolder: string): Promise<Offer> {
  const [scanPath] = operands;
  const recipePath = options.get('recipe');
  if (scanPath === undefined) {
    if (recipePath !== undefined) {
      throw wrongCall(spec, 'a recipe is given without a scan', 'Give the scan as well.');
    }
    return offerDemo(async (address) => {
      const path = await appFileAt(appFolder, address);
      return path === null ? null : (await stat(path)).size;
    });
  }
  const scan = await findScan(scanPath);
  if (recipePath === undefined) return offerScan(scan, null, []);
  const recipe = await readRecipeFile(recipePath);
  return offerScan(scan, recipe, await findCompanions(recipe));
}

function appMissing(folder: string): RimlightError {
  return new RimlightError('usage', {
    what: 'the app is not built',
    where: folder,
    hint: 'Run `npm run build` first.',
  });
}
