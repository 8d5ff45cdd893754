import type { ReactNode } from 'react';

/** A part of the recipe form: heading and explanation at the left, fields at the right where there is room. */
export function FormSection({ title, note, children }: { title: string; note?: ReactNode; children: ReactNode }) {
  return (
    <fieldset className="grid gap-x-8 gap-y-3 border-t border-line pt-5 min-[82rem]:grid-cols-[13rem_minmax(0,1fr)]">
      <div>
        <legend className="float-left w-full text-lg font-semibold">{title}</legend>
        {note && <p className="clear-both pt-0.5 text-sm text-ink-soft">{note}</p>}
      </div>
      <div className="min-w-0 space-y-4">{children}</div>
    </fieldset>
  );
}
