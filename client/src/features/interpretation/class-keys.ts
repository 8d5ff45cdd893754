import type { KeyMap } from '../../lib/keys.ts';

/** A class that may be named, with its place in the scheme for its pattern. */
export interface NameableClass {
  id: string;
  name: string;
  colour: string;
  position: number;
}

/** Classes the digits reach at a time. */
export const DIGITS = 10;

/** The digits of ten classes from `firstDigit` on: 1 to 9, then 0; and PgDn, PgUp for the other tens. */
export function classKeys(
  classes: readonly NameableClass[],
  firstDigit: number,
  onChoose: (classId: string) => void,
  onFirstDigit: (firstDigit: number) => void,
): KeyMap {
  const keys: KeyMap = {
    PageDown: () => firstDigit + DIGITS < classes.length && onFirstDigit(firstDigit + DIGITS),
    PageUp: () => onFirstDigit(Math.max(0, firstDigit - DIGITS)),
  };
  classes.slice(firstDigit, firstDigit + DIGITS).forEach(({ id }, place) => {
    keys[String((place + 1) % DIGITS)] = () => {
      releaseFocus();
      onChoose(id);
    };
  });
  return keys;
}

/**
 * Whether Enter belongs to the control that has the focus: a button or link takes it itself, but for the choice already
 * made (the class, the confidence), where it can only mean "save".
 */
export function takesEnter({ target }: KeyboardEvent): boolean {
  if (!(target instanceof HTMLElement)) return false;
  const control = target.closest('button, a');
  return (
    control !== null &&
    control.getAttribute('aria-pressed') !== 'true' &&
    control.getAttribute('aria-checked') !== 'true'
  );
}

/** Takes the focus from a control pressed before: it would take the Enter that is to save. */
export function releaseFocus(): void {
  const control = document.activeElement?.closest('button, a');
  if (control instanceof HTMLElement) control.blur();
}
