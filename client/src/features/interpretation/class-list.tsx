import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { classNames } from '../../lib/class-names.ts';
import { DIGITS, type NameableClass } from './class-keys.ts';

export interface ClassListProps {
  classes: readonly NameableClass[];
  firstDigit: number;
  classId: string | null;
  alternateClassId: string | null;
  /** The digits set the second choice instead of the class. */
  isAlternate: boolean;
  isDisabled?: boolean;
  /** Said beside a class. */
  noteOf?: (classId: string) => string | null;
  onChoose: (classId: string) => void;
}

/** The classes with their digits, the class and the second choice marked. */
export function ClassList(props: ClassListProps) {
  const { classes, firstDigit, classId, alternateClassId, isAlternate, isDisabled = false, noteOf, onChoose } = props;
  return (
    <>
      <div
        role="group"
        aria-label={isAlternate ? 'Second choice' : 'Class of the point'}
        className="overflow-hidden rounded-lg border border-line bg-card"
      >
        {classes.map(({ id, name, colour, position }, place) => {
          const hasDigit = place >= firstDigit && place < firstDigit + DIGITS;
          const isFirst = classId === id;
          const isSecond = alternateClassId === id;
          const note = isFirst ? 'class' : isSecond ? 'second choice' : noteOf?.(id);
          return (
            <button
              key={id}
              type="button"
              aria-pressed={isAlternate ? isSecond : isFirst}
              disabled={isDisabled || (isAlternate && isFirst)}
              onClick={() => onChoose(id)}
              className={classNames(
                'focus-inset flex min-h-7 w-full items-center gap-2.5 border-b border-line px-2.5 text-left text-sm last:border-b-0 disabled:cursor-not-allowed',
                isFirst && 'bg-groundsel-wash font-semibold shadow-[inset_3px_0_0_var(--ink)]',
                isSecond && 'bg-sunken shadow-[inset_3px_0_0_var(--edge)]',
                !isFirst && !isSecond && 'enabled:hover:bg-sunken',
              )}
            >
              <span aria-hidden className="w-3 text-center text-xs font-medium text-ink-soft">
                {hasDigit && (place - firstDigit + 1) % DIGITS}
              </span>
              <ClassSwatch size="sm" colour={colour} position={position} />
              <span className="min-w-0 grow truncate">{name}</span>
              {note && <span className="text-xs font-normal text-ink-soft">{note}</span>}
            </button>
          );
        })}
      </div>
      {classes.length > DIGITS && (
        <p className="mt-1 text-xs text-ink-soft">
          The digits stand for classes {firstDigit + 1} to {Math.min(classes.length, firstDigit + DIGITS)} of{' '}
          {classes.length}; PgDn and PgUp change that.
        </p>
      )}
    </>
  );
}
