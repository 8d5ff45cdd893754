import type { ReactNode } from 'react';
import { Bud } from '../../components/layout/bud.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';

/** What a project goes through, for someone who has none yet. */
const STEPS = [
  ['Scenes', 'Bring in GeoTIFF bands and say what each one measures.'],
  ['Classes', 'Agree on the class scheme with the client.'],
  ['Samples', 'Draw training samples; see their spectra as you draw.'],
  ['Runs', 'Classify the whole scene; nothing you held out is learned from.'],
  ['Accuracy', 'Read the confusion matrix and what it is worth.'],
  ['Handover', 'Give the client a map that a stranger can check.'],
] as const;

/** Teaches the first step where there is no project. */
export function FirstProject({ action }: { action: ReactNode }) {
  return (
    <div className="grid items-start gap-x-14 gap-y-8 lg:grid-cols-[minmax(0,32rem)_minmax(0,26rem)]">
      <EmptyState title="No project yet" action={action}>
        A project holds one commission from the first scene to the handed-over map. Create one to start, or ask the lead
        of a project to add you by your e-mail address.
      </EmptyState>
      <section aria-labelledby="stages-heading">
        <h2 id="stages-heading" className="mb-3 text-lg font-semibold">
          How a project grows
        </h2>
        <ol>
          {STEPS.map(([name, text], index) => (
            <li key={name} className="relative flex gap-3.5 pb-4">
              {index < STEPS.length - 1 && (
                <span aria-hidden className="absolute top-5 bottom-0 left-[10px] w-0.5 bg-line" />
              )}
              <Bud state={index === 0 ? 'part' : 'empty'} className="relative mt-px size-[22px] shrink-0" />
              <div>
                <p className="font-medium">{name}</p>
                <p className="text-sm text-ink-soft">{text}</p>
              </div>
            </li>
          ))}
        </ol>
      </section>
    </div>
  );
}
