/** Files dropped anywhere on the page are opened; while they hover, the page says so. */
import { useEffect, useRef, useState } from 'react';
import { useSession, useWorkbench } from '../workbench-context';
import { dropInWords } from './drop-words';
import styles from './drop-zone.module.css';

export function DropZone({ onFiles }: { readonly onFiles: (files: readonly File[]) => void }) {
  const [isOver, setOver] = useState(false);
  const { notices } = useWorkbench();
  const opening = useSession(({ draft }) => draft?.inputs.scan.name ?? null);
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
      if (hasFolder(event.dataTransfer)) {
        notices.say('error', 'A folder was dropped', { hint: 'Drop the files that are in it.' });
        return;
      }
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
  }, [notices]);
  if (!isOver) return null;
  return (
    <div className={styles.zone}>
      <p>{dropInWords(opening)}</p>
    </div>
  );
}

/** A folder comes as a file that cannot be read. */
function hasFolder(transfer: DataTransfer | null): boolean {
  return [...(transfer?.items ?? [])].some((item) => item.webkitGetAsEntry()?.isDirectory === true);
}
