/** Opens the browser's own file chooser. */
import { useCallback, useEffect, useRef } from 'react';

/** @returns what opens the chooser */
export function useFilePicker(onFiles: (files: readonly File[]) => void): () => void {
  const input = useRef<HTMLInputElement | null>(null);
  const latest = useRef(onFiles);
  useEffect(() => {
    latest.current = onFiles;
  });
  useEffect(() => {
    const element = document.createElement('input');
    element.type = 'file';
    element.multiple = true;
    element.hidden = true;
    element.dataset.testid = 'file-input';
    element.addEventListener('change', () => {
      const files = [...(element.files ?? [])];
      // The same file chosen again is a change, too.
      element.value = '';
      if (files.length > 0) latest.current(files);
    });
    document.body.append(element);
    input.current = element;
    return () => element.remove();
  }, []);
  return useCallback(() => input.current?.click(), []);
}
