/** Hands key presses anywhere on the page to their actions; what is typed into a field stays there. */
import { useEffect, useRef } from 'react';
import { actionOf, type KeyAction } from './key-bindings';
import { takesText } from './key-target';

export function useKeys(actions: Readonly<Record<KeyAction, () => void>>): void {
  const latest = useRef(actions);
  useEffect(() => {
    latest.current = actions;
  });
  useEffect(() => {
    const act = (event: KeyboardEvent): void => {
      if (event.defaultPrevented || isTyping(event.target) || isSheetOpen()) return;
      const action = actionOf(event);
      if (action === null) return;
      event.preventDefault();
      event.stopPropagation();
      latest.current[action]();
    };
    // A closed list would take a letter for the beginning of another choice: "l" would change the map as well.
    const actBefore = (event: KeyboardEvent): void => {
      if (isClosedList(event.target)) act(event);
    };
    window.addEventListener('keydown', actBefore, { capture: true });
    window.addEventListener('keydown', act);
    return () => {
      window.removeEventListener('keydown', actBefore, { capture: true });
      window.removeEventListener('keydown', act);
    };
  }, []);
}

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && takesText(target);
}

function isClosedList(target: EventTarget | null): boolean {
  return target instanceof Element && target.closest('[aria-haspopup="listbox"]') !== null;
}

/** Behind an open sheet nothing may change. */
function isSheetOpen(): boolean {
  return document.querySelector('[role="dialog"], [role="listbox"]') !== null;
}
