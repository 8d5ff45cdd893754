import { classNames } from '../../lib/class-names.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { Button } from './button.tsx';

export interface ErrorStateProps {
  /** Anything thrown; a ProblemError says what was found, what is wanted and what to do. */
  error: unknown;
  onRetry?: () => void;
  retryLabel?: string;
  /** A bordered note inside a form, slip or dialog; else a block of the page. */
  isInline?: boolean;
  className?: string;
}

/** What went wrong, in the order a person needs it. */
export function ErrorState({ error, onRetry, retryLabel = 'Try again', isInline = false, className }: ErrorStateProps) {
  const problem = asProblem(error);
  const facts = [
    ['Found', problem.found],
    ['Wanted', problem.wanted],
    ['What to do', problem.advice],
  ].filter((fact): fact is [string, string] => Boolean(fact[1]));
  return (
    <div
      role="alert"
      className={classNames(
        isInline
          ? 'rounded-r-lg border-l-[3px] border-rust bg-rust-wash px-3 py-2 text-sm'
          : 'max-w-xl rounded-xl border border-line bg-card px-6 py-5',
        className,
      )}
    >
      <p className={classNames('font-semibold', isInline ? '' : 'text-xl tracking-tight')}>{problem.title}</p>
      {problem.detail && <p className={isInline ? '' : 'mt-1 text-ink-soft'}>{problem.detail}</p>}
      {facts.length > 0 && (
        <dl className={classNames('grid grid-cols-[auto_1fr] gap-x-3 gap-y-0.5', isInline ? 'mt-1' : 'mt-3')}>
          {facts.map(([term, text]) => (
            <div key={term} className="contents">
              <dt className="text-ink-soft">{term}</dt>
              <dd>{text}</dd>
            </div>
          ))}
        </dl>
      )}
      {problem.errors.length > 0 && (
        <ul className="mt-2 list-disc pl-5">
          {problem.errors.map((field) => (
            <li key={`${field.path} ${field.message}`}>
              {field.path && <span className="font-medium">{field.path}: </span>}
              {field.message}
            </li>
          ))}
        </ul>
      )}
      {onRetry && (
        <Button className={isInline ? 'mt-2' : 'mt-4'} size={isInline ? 'sm' : 'md'} onClick={onRetry}>
          {retryLabel}
        </Button>
      )}
    </div>
  );
}
