import type { LandClass } from '../../../../shared/contracts/land-class.ts';

/** The classes in the order of `ids`, each with its new place; classes `ids` does not name keep the end. */
export function placeInOrder(classes: readonly LandClass[], ids: readonly string[]): LandClass[] {
  const place = (landClass: LandClass) => {
    const index = ids.indexOf(landClass.id);
    return index === -1 ? ids.length : index;
  };
  return classes.toSorted((a, b) => place(a) - place(b)).map((landClass, position) => ({ ...landClass, position }));
}

/** `ids` with one of them moved to another place (from 0); a place outside the list is its nearest end. */
export function moveId(ids: readonly string[], id: string, to: number): string[] {
  const rest = ids.filter((other) => other !== id);
  return rest.toSpliced(Math.max(0, Math.min(rest.length, to)), 0, id);
}
