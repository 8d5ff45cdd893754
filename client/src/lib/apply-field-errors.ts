import type { FieldValues, Path, UseFormSetError } from 'react-hook-form';
import { ProblemError } from './problem-error.ts';

/**
 * Puts the server's refused fields onto the form's fields.
 *
 * @returns false when the error names no field of the form, so that the caller shows it whole
 */
export function applyFieldErrors<T extends FieldValues>(
  error: unknown,
  setError: UseFormSetError<T>,
  fieldNames: readonly Path<T>[],
): boolean {
  if (!(error instanceof ProblemError)) return false;
  const known = error.errors.filter(({ path }) => (fieldNames as readonly string[]).includes(path));
  known.forEach(({ path, message }, index) =>
    setError(path as Path<T>, { type: 'server', message }, { shouldFocus: index === 0 }),
  );
  return known.length > 0;
}
