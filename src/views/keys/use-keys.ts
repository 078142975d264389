/** Hands key presses anywhere on the page to their actions; what is typed into a field stays there. */
import { useEffect, useRef } from 'react';
import { actionOf, type KeyAction } from './key-bindings';

export function useKeys(actions: Readonly<Record<KeyAction, () => void>>): void {
  const latest = useRef(actions);
  useEffect(() => {
    latest.current = actions;
  });
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent): void => {
      if (event.defaultPrevented || isTyping(event.target) || isSheetOpen()) return;
      const action = actionOf(event);
      if (action === null) return;
      event.preventDefault();
      latest.current[action]();
    };
    window.addEventListener('keydown', onKeyDown);
    return () => window.removeEventListener('keydown', onKeyDown);
  }, []);
}

function isTyping(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false;
  return target.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName);
}

/** Behind an open sheet nothing may change. */
function isSheetOpen(): boolean {
  return document.querySelector('[role="dialog"], [role="listbox"]') !== null;
}
