import type { ButtonHTMLAttributes, ReactNode, Ref } from 'react';
import { classNames } from '../../lib/class-names.ts';

export type ButtonKind = 'primary' | 'strong' | 'secondary' | 'ghost' | 'danger';
export type ButtonSize = 'md' | 'sm';

export interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  /** primary: the page's one act; strong: the act inside a slip or dialog; secondary, ghost, danger as they say. */
  kind?: ButtonKind;
  size?: ButtonSize;
  /** Work is under way: the button keeps its width, takes no second press and says so. */
  isPending?: boolean;
  /** Said instead of the children while pending: "Saving…". */
  pendingLabel?: string;
  icon?: ReactNode;
  ref?: Ref<HTMLButtonElement>;
}

const KIND: Record<ButtonKind, string> = {
  primary: 'bg-groundsel text-on-groundsel font-semibold enabled:hover:brightness-95',
  strong: 'bg-ink text-paper font-medium enabled:hover:opacity-90',
  secondary: 'bg-card text-ink font-medium border border-edge enabled:hover:bg-sunken',
  ghost: 'text-ink font-medium enabled:hover:bg-sunken',
  danger: 'bg-rust text-on-rust font-medium enabled:hover:brightness-95',
};
const SIZE: Record<ButtonSize, string> = {
  md: 'min-h-9 px-4 py-1.5 text-base',
  sm: 'min-h-7 px-2.5 py-1 text-sm',
};

/** The classes of a button, for a link that looks like one. */
export function buttonClass(kind: ButtonKind = 'secondary', size: ButtonSize = 'md'): string {
  return classNames(
    'inline-flex items-center justify-center gap-2 rounded-lg whitespace-nowrap select-none no-underline',
    'disabled:cursor-not-allowed disabled:opacity-55 [&_svg]:size-4 [&_svg]:shrink-0',
    KIND[kind],
    SIZE[size],
  );
}

export function Button({
  kind = 'secondary',
  size = 'md',
  isPending = false,
  pendingLabel,
  icon,
  className,
  children,
  type = 'button',
  disabled,
  onClick,
  ...rest
}: ButtonProps) {
  return (
    <button
      {...rest}
      type={type}
      disabled={disabled}
      aria-disabled={isPending || undefined}
      aria-busy={isPending || undefined}
      onClick={(event) => {
        // A pending button stays focusable, so that the keyboard does not lose its place; it only takes no press.
        if (isPending) event.preventDefault();
        else onClick?.(event);
      }}
      className={classNames(buttonClass(kind, size), isPending && 'cursor-progress', className)}
    >
      {icon}
      {isPending ? (pendingLabel ?? children) : children}
      {isPending && <span aria-hidden className="waiting size-2 rounded-full bg-current" />}
    </button>
  );
}
