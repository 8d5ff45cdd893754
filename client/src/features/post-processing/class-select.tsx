import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { Select } from '../../components/ui/select.tsx';
import type { ClassChoice } from './step-text.ts';

interface ClassSelectProps {
  value: string;
  onChange: (value: string) => void;
  classes: readonly ClassChoice[];
  /** Needed outside a Field. */
  label?: string;
  withAny?: boolean;
  withNodata?: boolean;
}

/** A class of the map, or what stands for none. */
export function ClassSelect({ value, onChange, classes, label, withAny, withNodata }: ClassSelectProps) {
  return (
    <Select
      size="sm"
      className="min-w-0 flex-1"
      {...(label !== undefined && { 'aria-label': label })}
      value={value}
      onChange={onChange}
      options={[
        ...(withAny ? [{ value: 'any', label: 'any class' }] : []),
        ...classes.map(({ id, name, colour }, position) => ({
          ...{ value: id, label: name },
          mark: <ClassSwatch colour={colour} position={position} />,
        })),
        { value: 'unclassified', label: 'unclassified' },
        ...(withNodata ? [{ value: 'nodata', label: 'no data' }] : []),
      ]}
    />
  );
}
