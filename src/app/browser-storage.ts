/** The browser's own database as the place where work is kept between visits. */
import { get, set } from 'idb-keyval';
import type { WorkStorage } from '../state/autosave';

export const browserStorage: WorkStorage = { get: (key) => get(key), set };
