import { useEffect, useRef } from 'react';

/**
 * Shortcuts by name: "p", "?", "Escape", "1", "mod+z", "mod+shift+z" (mod is Ctrl, or ⌘ on a Mac).
 * A handler that returns false lets the browser act as well.
 */
export type KeyMap = Record<string, (event: KeyboardEvent) => unknown>;

/** Listens for shortcuts while the component is there; typing in a field, and open dialogs or menus, are left alone. */
export function useKeys(keys: KeyMap, isOn = true): void {
  const latest = useRef(keys);
  useEffect(() => {
    latest.current = keys;
  });
  useEffect(() => {
    if (!isOn) return undefined;
    const listen = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.isComposing || isTakenByTarget(event)) return;
      const handler = latest.current[keyName(event)];
      if (handler && handler(event) !== false) event.preventDefault();
    };
    window.addEventListener('keydown', listen);
    return () => window.removeEventListener('keydown', listen);
  }, [isOn]);
}

/** The name a KeyMap uses for a keyboard event. Shift is named only for letters and named keys: "?" is "?". */
export function keyName(event: Pick<KeyboardEvent, 'key' | 'ctrlKey' | 'metaKey' | 'shiftKey' | 'altKey'>): string {
  const isLetter = /^[a-z]$/i.test(event.key);
  const key = event.key.length === 1 ? event.key.toLowerCase() : event.key;
  const names: string[] = [];
  if (event.ctrlKey || event.metaKey) names.push('mod');
  if (event.altKey) names.push('alt');
  if (event.shiftKey && (isLetter || event.key.length > 1)) names.push('shift');
  names.push(key);
  return names.join('+');
}

/** True when the event's target wants the keys itself: a text field, a list box, a menu or a dialog. */
function isTakenByTarget(event: KeyboardEvent): boolean {
  const target = event.target;
  if (!(target instanceof HTMLElement)) return false;
  if (target.isContentEditable) return true;
  if (target.closest('[role=dialog],[role=alertdialog],[role=menu],[role=listbox]')) return true;
  if (target instanceof HTMLInputElement) return !['checkbox', 'radio', 'button', 'range'].includes(target.type);
  return target instanceof HTMLTextAreaElement || target instanceof HTMLSelectElement;
}
