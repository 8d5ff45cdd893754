import type { Accuracy } from '../../../../shared/contracts/accuracy.ts';
import { Callout } from '../../components/ui/callout.tsx';
import { formatCount } from '../../lib/format.ts';

const LISTED_OPENLY = 2;

/** Which classes have too little to be judged by. */
export function BewareFew({ accuracy }: { accuracy: Accuracy }) {
  const few = accuracy.perClass.flatMap((row, index) =>
    row.warning ? [{ id: row.classId, name: accuracy.classes[index]?.name ?? '', warning: row.warning }] : [],
  );
  if (few.length === 0) return null;
  const list = (
    <ul className="mt-1 space-y-1">
      {few.map(({ id, name, warning }) => (
        <li key={id}>
          <span className="font-medium">{name}.</span> {warning}
        </li>
      ))}
    </ul>
  );
  return (
    <Callout tone="beware" title="Beware.">
      {few.length <= LISTED_OPENLY ? (
        <>Read these by their interval. {list}</>
      ) : (
        <>
          {few.length === accuracy.classes.length
            ? 'All classes have'
            : `${formatCount(few.length, 'class', 'classes')} of ${accuracy.classes.length} have`}{' '}
          too few held-out samples to rely on; read their figures by their interval.
          <details className="mt-1 print:hidden">
            <summary className="link cursor-pointer">Which, and by how much</summary>
            {list}
          </details>
          <div className="hidden print:block">{list}</div>
        </>
      )}
    </Callout>
  );
}
