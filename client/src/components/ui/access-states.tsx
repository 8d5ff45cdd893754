import type { ReactNode } from 'react';

interface AccessStateProps {
  title?: ReactNode;
  children?: ReactNode;
  action?: ReactNode;
}

/** The viewer's roles do not reach here: says who can let them in. */
export function ForbiddenState({ title = 'This is not open to your role', children, action }: AccessStateProps) {
  return (
    <Plain title={title} action={action}>
      {children ?? 'Your project lead gives out roles. Ask for the one this page needs.'}
    </Plain>
  );
}

/** There is nothing at this address, or nothing the viewer may know of. */
export function NotFoundState({ title = 'Nothing is kept here', children, action }: AccessStateProps) {
  return (
    <Plain title={title} action={action}>
      {children ?? 'It may have been deleted, or the address has a slip in it.'}
    </Plain>
  );
}

function Plain({ title, children, action }: AccessStateProps) {
  return (
    <div className="max-w-xl rounded-xl border border-line bg-card px-6 py-5">
      <p className="text-xl font-semibold tracking-tight">{title}</p>
      <div className="mt-1 text-ink-soft">{children}</div>
      {action && <div className="mt-4">{action}</div>}
    </div>
  );
}
