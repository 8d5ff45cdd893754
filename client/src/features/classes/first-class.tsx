import type { ReactNode } from 'react';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { CLASS_PALETTE } from '../../../../shared/constants/class-palette.ts';

const PARTS = [
  ['Name', 'What the client calls it: “Saltmarsh”, not “C3”.'],
  ['Code', 'The pixel value in the class map, 1 to 254.'],
  ['Colour', 'One of ten that colour-blind readers can tell apart, or any other.'],
  ['Definition', 'What belongs to it and what does not, so that two people draw the same.'],
] as const;

/** Teaches what a class is made of where the scheme is empty; the action is left out for those who may not add one. */
export function FirstClass({ action }: { action?: ReactNode }) {
  return (
    <div className="grid items-start gap-x-14 gap-y-8 lg:grid-cols-[minmax(0,34rem)_minmax(0,26rem)]">
      <EmptyState title="No class yet" action={action}>
        {action
          ? 'The class scheme is what you and the client agree to map. A run needs at least two classes; you may add, change and reorder them at any time.'
          : 'The project lead defines the class scheme. Samples can be drawn once there is one.'}
      </EmptyState>
      <section aria-labelledby="class-parts">
        <h2 id="class-parts" className="mb-2 text-lg font-semibold">
          What a class is made of
        </h2>
        <dl className="text-sm">
          {PARTS.map(([part, text]) => (
            <div key={part} className="flex gap-4 border-t border-line py-2.5">
              <dt className="w-20 shrink-0 font-medium">{part}</dt>
              <dd className="text-ink-soft">
                {text}
                {part === 'Colour' && (
                  <span className="mt-1.5 flex gap-1.5">
                    {CLASS_PALETTE.map(({ colour, pattern }) => (
                      <ClassSwatch key={colour} colour={colour} pattern={pattern} />
                    ))}
                  </span>
                )}
              </dd>
            </div>
          ))}
        </dl>
      </section>
    </div>
  );
}
