/** What is on screen first: the scan the page was started with, the work of the last visit, or the demo. */
import type { SourceHandle } from '../../workers/engine';
import { RimlightError } from '../errors';
import type { Recipe } from '../recipe/schema';
import { loadLastWork, type WorkStorage } from '../state/autosave';
import { openLastWork } from '../state/last-work';
import { readRecipe } from '../state/recipe-files';
import { openOffered } from '../state/scan-opening';
import type { Workbench } from '../state/workbench';

interface OfferedFile {
  readonly name: string;
  readonly url: string;
  readonly size: number;
}

interface Manifest {
  readonly scan: OfferedFile | null;
  readonly recipe: OfferedFile | null;
  readonly companions: readonly OfferedFile[];
}

export async function openFirstScan(workbench: Workbench, storage: WorkStorage): Promise<void> {
  const [manifest, last] = await Promise.all([
    fetchManifest(),
    loadLastWork(storage).catch(() => null),
  ]);
  const offered = manifest.scan;
  if (last !== null && last.inputs !== null && !isGivenOnStart(offered)) {
    if (await openLastWork(workbench, last.inputs, last.recipe)) return;
  }
  if (offered === null) return;
  const isSame = last !== null && last.work.url === offered.url;
  const recipe = isSame ? last.recipe : await fetchRecipe(manifest.recipe);
  const scan = await fetchFile(offered);
  const companions = await Promise.all(manifest.companions.map(fetchFile));
  await openOffered(workbench, { scan, companions }, recipe, offered.url);
  if (last !== null && last.work.url === null && last.inputs === null) {
    workbench.notices.say('warning', `The work on ${last.work.scanName} is kept.`, {
      hint: 'The file was too large to keep: open it again to go on.',
    });
  }
}

/** A scan named on the command line comes before the work of the last visit; the demo does not. */
function isGivenOnStart(offered: OfferedFile | null): boolean {
  return offered?.url.startsWith('/open/') ?? false;
}

async function fetchManifest(): Promise<Manifest> {
  const response = await fetch('/open/manifest.json');
  if (!response.ok) return { scan: null, recipe: null, companions: [] };
  return response.json();
}

async function fetchFile({ name, url }: OfferedFile): Promise<SourceHandle> {
  const response = await fetch(url);
  if (!response.ok) throw notServed(name);
  return { kind: 'blob', name, blob: await response.blob() };
}

async function fetchRecipe(file: OfferedFile | null): Promise<Recipe | null> {
  if (file === null) return null;
  const response = await fetch(file.url);
  if (!response.ok) throw notServed(file.name);
  return readRecipe(await response.text(), file.name);
}

function notServed(name: string): RimlightError {
  return new RimlightError('scan', {
    what: `the server did not give ${name}`,
    where: '',
    hint: 'Start it again, or open the file from disk.',
  });
}
