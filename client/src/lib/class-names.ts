/** Joins the class names that are set: `classNames('a', isOn && 'b')` is `'a b'` or `'a'`. */
export function classNames(...names: (string | false | null | undefined)[]): string {
  return names.filter(Boolean).join(' ');
}
