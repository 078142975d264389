/** The scan on screen, the one being opened, and how far that is. */
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { OpenScan, ScanInputs } from '../../workers/engine';
import type { ScanChoices } from '../io/scan-choices';
import type { Inspection, Preview } from '../io/scan-plan';
import type { Recipe } from '../recipe/schema';

/** An import sheet in progress; the scan on screen stays until it is accepted. */
export interface ImportDraft {
  readonly inputs: ScanInputs;
  /** what the user has stated so far */
  readonly choices: ScanChoices;
  /** a recipe given together with the scan; null when the scan starts a new one */
  readonly recipe: Recipe | null;
  /** null while the file is being looked at */
  readonly inspection: Inspection | null;
  /** null while it is being made, or when the scan cannot be read yet */
  readonly preview: Preview | null;
  /** true until the file has been looked at with what was stated last; `inspection` is of what was stated before */
  readonly isLooking: boolean;
  /** true when the sheet corrects the scan on screen instead of opening another */
  readonly isRevision: boolean;
}

export interface Running {
  /** "Opening tent-field.h5" */
  readonly label: string;
  /** 0 to 1 */
  readonly share: number;
  /** performance.now() at the start, for the time left */
  readonly startedMs: number;
  readonly stop: () => void;
}

export interface CurrentScan {
  readonly open: OpenScan;
  readonly inputs: ScanInputs;
  /** set for a scan the page itself offered (the demo, `rimlight serve SCAN`): it can be fetched again */
  readonly url: string | null;
}

export interface SessionState {
  /** null before the first scan is open */
  readonly scan: CurrentScan | null;
  /** counts up with every scan opened; the key of everything computed from it */
  readonly scanNumber: number;
  /** SHA-256 of the scan file; null until it is known */
  readonly sha256: string | null;
  readonly draft: ImportDraft | null;
  /** a long run in progress, or null */
  readonly running: Running | null;
}

export type SessionStore = StoreApi<SessionState>;

export function createSessionStore(): SessionStore {
  return createStore<SessionState>(() => ({
    scan: null,
    scanNumber: 0,
    sha256: null,
    draft: null,
    running: null,
  }));
}
