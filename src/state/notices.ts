/** Short messages to the user: what went wrong or was done, with at most one thing to do about it. */
import { createStore, type StoreApi } from 'zustand/vanilla';
import { ensureRimlightError } from '../errors';

export interface NoticeAction {
  readonly label: string;
  readonly run: () => void;
}

export interface Notice {
  readonly id: number;
  readonly tone: 'error' | 'warning' | 'done';
  readonly text: string;
  /** the action the user can take, as words; shown after the text */
  readonly hint: string;
  readonly action: NoticeAction | null;
}

export interface NoticesState {
  /** oldest first; empty when there is nothing to say */
  readonly notices: readonly Notice[];
}

export interface Notices extends StoreApi<NoticesState> {
  say(
    tone: Notice['tone'],
    text: string,
    options?: { hint?: string; action?: NoticeAction },
  ): number;
  /** Any thrown value; what the user stopped is not worth a notice. */
  sayError(error: unknown): void;
  dismiss(id: number): void;
}

const mostShown = 4;

export function createNotices(): Notices {
  const store = createStore<NoticesState>(() => ({ notices: [] }));
  let nextId = 1;
  const say: Notices['say'] = (tone, text, options = {}) => {
    const id = nextId++;
    const notice = { id, tone, text, hint: options.hint ?? '', action: options.action ?? null };
    const others = store.getState().notices.filter((other) => other.text !== text);
    store.setState({ notices: [...others, notice].slice(-mostShown) });
    return id;
  };
  return Object.assign(store, {
    say,
    sayError(error: unknown): void {
      const known = ensureRimlightError(error);
      if (known.kind === 'cancelled') return;
      const place = known.where === '' ? '' : ` (${known.where})`;
      say('error', `${capitalised(known.what)}${place}.`, { hint: known.hint });
    },
    dismiss(id: number): void {
      store.setState(({ notices }) => ({ notices: notices.filter((notice) => notice.id !== id) }));
    },
  });
}

function capitalised(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
