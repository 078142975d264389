/** What a served page is to open at once: a scan, its recipe, the files the recipe names. */

/** A file the page may fetch; `url` is a path on this server. */
export interface OfferedFile {
  /** file name without folder */
  readonly name: string;
  readonly url: string;
  /** bytes */
  readonly size: number;
}

/** `/open/manifest.json`; a scan of null means: begin with an empty screen. */
export interface OpenManifest {
  readonly scan: OfferedFile | null;
  readonly recipe: OfferedFile | null;
  readonly companions: readonly OfferedFile[];
}

/** The manifest, and where the files behind its addresses lie. */
export interface Offer {
  readonly manifest: OpenManifest;
  /** path on disk of each offered address */
  readonly files: ReadonlyMap<string, string>;
}

/** A file on disk that is to be offered. */
export interface FileOnDisk {
  readonly name: string;
  readonly path: string;
  readonly size: number;
}

export const manifestAddress = '/open/manifest.json';

/** Offers a scan given on the command line. Each kind has a folder of its own, so that equal names do not meet. */
export function offerScan(
  scan: FileOnDisk,
  recipe: FileOnDisk | null,
  companions: readonly FileOnDisk[],
): Offer {
  const files = new Map<string, string>();
  const offered = (folder: string, { name, path, size }: FileOnDisk): OfferedFile => {
    const url = `/open/${folder}/${encodeURIComponent(name)}`;
    files.set(url, path);
    return { name, url, size };
  };
  return {
    manifest: {
      scan: offered('scan', scan),
      recipe: recipe === null ? null : offered('recipe', recipe),
      companions: companions.map((file) => offered('companions', file)),
    },
    files,
  };
}

const demo = 'tent-field';

/**
 * Offers the demo scan, which lies among the app's own files.
 *
 * @param sizeOf - bytes of one of the app's files; null where it is absent
 */
export async function offerDemo(
  sizeOf: (address: string) => Promise<number | null>,
): Promise<Offer> {
  const offered = async (name: string): Promise<OfferedFile | null> => {
    const url = `/sample-data/${name}`;
    const size = await sizeOf(url);
    return size === null ? null : { name, url, size };
  };
  const scan = await offered(`${demo}.h5`);
  const recipe = scan === null ? null : await offered(`${demo}.recipe.json`);
  return { manifest: { scan, recipe, companions: [] }, files: new Map() };
}
