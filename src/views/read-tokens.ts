/** The colour tokens as values, for what is drawn on canvases and plots. */
import type { Theme } from '../state/view-store';

export interface Tokens {
  readonly ink: string;
  readonly ink2: string;
  readonly ink3: string;
  readonly grid: string;
  readonly plot: string;
  readonly accent: string;
  readonly mono: string;
}

/** @param _theme - named so that callers read again when it changes */
export function readTokens(_theme: Theme): Tokens {
  const style = getComputedStyle(document.documentElement);
  const value = (name: string): string => style.getPropertyValue(name).trim();
  return {
    ink: value('--ink'),
    ink2: value('--ink-2'),
    ink3: value('--ink-3'),
    grid: value('--grid'),
    plot: value('--plot'),
    accent: value('--accent'),
    mono: value('--mono'),
  };
}
