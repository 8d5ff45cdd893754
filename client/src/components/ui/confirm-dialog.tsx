import { AlertDialog as Base } from 'radix-ui';
import { type ReactNode, useState } from 'react';
import type { ProblemError } from '../../lib/problem-error.ts';
import { Button } from './button.tsx';
import { ErrorState } from './error-state.tsx';
import { Field } from './field.tsx';
import { TextInput } from './text-input.tsx';

export interface ConfirmDialogProps {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  /** A question: "Delete the class Saltmarsh?" */
  title: ReactNode;
  /** What is lost, one line each; said before anything happens. */
  loses?: ReactNode[];
  /** What stays, when that is not plain. */
  keeps?: ReactNode;
  /** What the button does: "Delete class". */
  confirmLabel: string;
  /** The way out; says what stays as it is. */
  cancelLabel?: string;
  isPending?: boolean;
  error?: ProblemError | null;
  /** A word to type before the button works, for what cannot be undone by anyone. */
  typeToConfirm?: string;
  isDanger?: boolean;
  onConfirm: () => void;
  /** More to decide: where the samples of a deleted class go. */
  children?: ReactNode;
}

/** Asks before something is lost, and says what. Focus starts on the way out. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  return (
    <Base.Root open={props.isOpen} onOpenChange={props.onOpenChange}>
      <Base.Portal>
        <Base.Overlay className="fixed inset-0 z-[1100] bg-[rgb(20_28_25/0.45)]" />
        <Base.Content className="appear fixed inset-x-0 top-[16vh] z-[1110] mx-auto max-h-[78vh] w-[calc(100vw-2rem)] max-w-md overflow-y-auto rounded-xl border border-line bg-card p-5 shadow-lift">
          <ConfirmBody {...props} />
        </Base.Content>
      </Base.Portal>
    </Base.Root>
  );
}

function ConfirmBody({
  title,
  loses = [],
  keeps,
  confirmLabel,
  cancelLabel = 'Keep it',
  isPending = false,
  error,
  typeToConfirm,
  isDanger = true,
  onConfirm,
  children,
}: ConfirmDialogProps) {
  const [typed, setTyped] = useState('');
  const isLocked = typeToConfirm !== undefined && typed.trim() !== typeToConfirm;
  return (
    <>
      <Base.Title className="text-xl font-semibold tracking-tight">{title}</Base.Title>
      <Base.Description asChild>
        <div className="mt-2 text-base">
          {loses.length > 0 && (
            <>
              <p className="font-medium">This is lost:</p>
              <ul className="mt-1 list-disc space-y-0.5 pl-5">
                {loses.map((line, index) => (
                  <li key={index}>{line}</li>
                ))}
              </ul>
            </>
          )}
          {keeps && <p className="mt-2 text-ink-soft">{keeps}</p>}
        </div>
      </Base.Description>
      {children && <div className="mt-4">{children}</div>}
      {typeToConfirm !== undefined && (
        <Field className="mt-4" label={<>Type “{typeToConfirm}” to go on</>}>
          <TextInput value={typed} onChange={(event) => setTyped(event.target.value)} autoComplete="off" />
        </Field>
      )}
      {error && <ErrorState className="mt-4" error={error} isInline />}
      <div className="mt-5 flex justify-end gap-2">
        <Base.Cancel asChild>
          <Button>{cancelLabel}</Button>
        </Base.Cancel>
        <Button kind={isDanger ? 'danger' : 'strong'} isPending={isPending} disabled={isLocked} onClick={onConfirm}>
          {confirmLabel}
        </Button>
      </div>
    </>
  );
}
