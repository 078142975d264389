/** Hands a text file to the user. */
import type { TextFile } from '../../state/recipe-files';

export function download({ name, text }: TextFile): void {
  const url = URL.createObjectURL(new Blob([text], { type: 'application/json' }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // The browser has taken hold of the file by the next turn.
  setTimeout(() => URL.revokeObjectURL(url), 1000);
}
