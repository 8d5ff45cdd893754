import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { Button, type ButtonProps } from './button.tsx';
import { Tooltip } from './tooltip.tsx';

export interface IconButtonProps extends Omit<ButtonProps, 'children' | 'icon' | 'aria-label'> {
  /** Accessible name, also the tooltip. */
  label: string;
  icon: ReactNode;
  /** Key that does the same, shown in the tooltip. */
  shortcut?: string;
  /** For buttons that stay on: sets aria-pressed. */
  isOn?: boolean;
}

/** A square button that is only a picture; its name is in the tooltip and read out. */
export function IconButton({
  label,
  icon,
  shortcut,
  isOn,
  kind = 'ghost',
  size = 'md',
  className,
  ...rest
}: IconButtonProps) {
  return (
    <Tooltip text={label} shortcut={shortcut}>
      <Button
        {...rest}
        kind={isOn ? 'strong' : kind}
        size={size}
        aria-label={label}
        aria-pressed={isOn}
        className={classNames(size === 'sm' ? 'w-7' : 'w-9', 'px-0!', className)}
      >
        {icon}
      </Button>
    </Tooltip>
  );
}
