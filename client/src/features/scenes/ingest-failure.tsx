import type { Scene } from '../../../../shared/contracts/scene.ts';

/** Why a scene could not be taken: what was found, what is wanted, what to do. */
export function IngestFailure({ failure, className }: { failure: NonNullable<Scene['failure']>; className?: string }) {
  const facts = [
    ['Found', failure.found],
    ['Wanted', failure.wanted],
    ['What to do', failure.advice],
  ] as const;
  return (
    <div className={className}>
      <dl className="grid grid-cols-[auto_1fr] gap-x-3 gap-y-1 rounded-r-lg border-l-[3px] border-rust bg-rust-wash px-3 py-2 text-sm">
        {facts.map(([term, text]) => (
          <div key={term} className="contents">
            <dt className="text-ink-soft">{term}</dt>
            <dd className="min-w-0 break-words">{text}</dd>
          </div>
        ))}
      </dl>
    </div>
  );
}
