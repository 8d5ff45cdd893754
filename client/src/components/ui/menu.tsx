import { Check } from 'lucide-react';
import { DropdownMenu as Base } from 'radix-ui';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { classNames } from '../../lib/class-names.ts';

export interface MenuProps {
  /** One button. */
  trigger: ReactNode;
  align?: 'start' | 'center' | 'end';
  side?: 'top' | 'right' | 'bottom' | 'left';
  children: ReactNode;
}

/** A list of acts under a button; fill with MenuItem, MenuChoice, MenuLabel, MenuLine. */
export function Menu({ trigger, align = 'end', side = 'bottom', children }: MenuProps) {
  return (
    <Base.Root>
      <Base.Trigger asChild>{trigger}</Base.Trigger>
      <Base.Portal>
        <Base.Content
          align={align}
          side={side}
          sideOffset={6}
          collisionPadding={8}
          className="appear z-[1200] min-w-48 rounded-lg border border-line bg-card p-1 shadow-lift"
        >
          {children}
        </Base.Content>
      </Base.Portal>
    </Base.Root>
  );
}

const ITEM =
  'flex min-h-8 cursor-pointer items-center gap-2.5 rounded-md px-2.5 py-1 text-base no-underline outline-none select-none ' +
  'data-highlighted:bg-groundsel-wash data-highlighted:outline-2 data-highlighted:-outline-offset-2 data-highlighted:outline-ink ' +
  'data-disabled:cursor-not-allowed data-disabled:opacity-50 [&_svg]:size-4 [&_svg]:shrink-0';

export interface MenuItemProps {
  children: ReactNode;
  icon?: ReactNode;
  shortcut?: string;
  isDanger?: boolean;
  isDisabled?: boolean;
  onSelect?: () => void;
  /** Makes it a link inside the product. */
  to?: string;
  /** Makes it a download. */
  href?: string;
}

export function MenuItem({ children, icon, shortcut, isDanger, isDisabled, onSelect, to, href }: MenuItemProps) {
  const inside = (
    <>
      {icon}
      <span className="grow">{children}</span>
      {shortcut && <span className="text-xs text-ink-soft">{shortcut}</span>}
    </>
  );
  return (
    <Base.Item
      asChild={Boolean(to ?? href)}
      disabled={isDisabled ?? false}
      onSelect={() => onSelect?.()}
      className={classNames(ITEM, isDanger && 'text-rust')}
    >
      {to ? (
        <Link to={to}>{inside}</Link>
      ) : href ? (
        <a href={href} download>
          {inside}
        </a>
      ) : (
        inside
      )}
    </Base.Item>
  );
}

export interface MenuChoiceProps<V extends string> {
  label: string;
  value: V;
  options: readonly { value: V; label: ReactNode }[];
  onChange: (value: V) => void;
}

/** One of a few, inside a menu; choosing leaves the menu open. */
export function MenuChoice<V extends string>({ label, value, options, onChange }: MenuChoiceProps<V>) {
  return (
    <Base.RadioGroup value={value} onValueChange={(next) => onChange(next as V)} aria-label={label}>
      <Base.Label className="px-2.5 pt-1.5 pb-0.5 text-xs text-ink-soft">{label}</Base.Label>
      {options.map((option) => (
        <Base.RadioItem
          key={option.value}
          value={option.value}
          onSelect={(event) => event.preventDefault()}
          className={ITEM}
        >
          <span className="grow">{option.label}</span>
          <Base.ItemIndicator>
            <Check aria-hidden />
          </Base.ItemIndicator>
        </Base.RadioItem>
      ))}
    </Base.RadioGroup>
  );
}

export function MenuLabel({ children }: { children: ReactNode }) {
  return <Base.Label className="px-2.5 py-1.5 text-xs text-ink-soft">{children}</Base.Label>;
}

export function MenuLine() {
  return <Base.Separator className="my-1 h-px bg-line" />;
}
