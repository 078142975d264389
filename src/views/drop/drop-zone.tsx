/** Files dropped anywhere on the page are opened; while they hover, the page says so. */
import { useEffect, useRef, useState } from 'react';
import styles from './drop-zone.module.css';

export function DropZone({ onFiles }: { readonly onFiles: (files: readonly File[]) => void }) {
  const [isOver, setOver] = useState(false);
  const latest = useRef(onFiles);
  useEffect(() => {
    latest.current = onFiles;
  });
  useEffect(() => {
    // Entering a child leaves its parent: counted, so that the sentence does not flicker.
    let depth = 0;
    const carriesFiles = (event: DragEvent): boolean =>
      event.dataTransfer?.types.includes('Files') ?? false;
    const enter = (event: DragEvent): void => {
      if (!carriesFiles(event)) return;
      depth++;
      setOver(true);
    };
    const leave = (): void => {
      depth = Math.max(0, depth - 1);
      if (depth === 0) setOver(false);
    };
    const allow = (event: DragEvent): void => {
      if (carriesFiles(event)) event.preventDefault();
    };
    const drop = (event: DragEvent): void => {
      if (!carriesFiles(event)) return;
      event.preventDefault();
      depth = 0;
      setOver(false);
      const files = [...(event.dataTransfer?.files ?? [])];
      if (files.length > 0) latest.current(files);
    };
    const listeners = [
      ['dragenter', enter],
      ['dragleave', leave],
      ['dragover', allow],
      ['drop', drop],
    ] as const;
    for (const [type, listener] of listeners) window.addEventListener(type, listener);
    return () => {
      for (const [type, listener] of listeners) window.removeEventListener(type, listener);
    };
  }, []);
  if (!isOver) return null;
  return (
    <div className={styles.zone}>
      <p>Drop a scan, with its height map or axis, or a recipe. Nothing leaves this machine.</p>
    </div>
  );
}
