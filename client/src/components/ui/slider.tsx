import { Slider as Base } from 'radix-ui';
import { classNames } from '../../lib/class-names.ts';

export interface SliderProps {
  /** One value or a pair: as many thumbs. */
  value: number[];
  onChange: (value: number[]) => void;
  /** Called once, on letting go: for what is costly. */
  onCommit?: (value: number[]) => void;
  min: number;
  max: number;
  step?: number;
  /** A name for each thumb: ["Lowest", "Highest"]. */
  labels: string[];
  /** How a value is read out: 0.4 → "40 %". */
  formatValue?: (value: number) => string;
  isDisabled?: boolean;
  className?: string;
}

export function Slider({
  value,
  onChange,
  onCommit,
  min,
  max,
  step = 1,
  labels,
  formatValue,
  isDisabled,
  className,
}: SliderProps) {
  return (
    <Base.Root
      value={value}
      onValueChange={onChange}
      onValueCommit={(next) => onCommit?.(next)}
      min={min}
      max={max}
      step={step}
      disabled={isDisabled ?? false}
      className={classNames(
        'relative flex h-6 w-full touch-none items-center select-none data-disabled:opacity-50',
        className,
      )}
    >
      <Base.Track className="relative h-1 grow rounded-full bg-edge">
        <Base.Range className="absolute h-full rounded-full bg-ink" />
      </Base.Track>
      {value.map((figure, index) => (
        <Base.Thumb
          key={labels[index]}
          aria-label={labels[index]}
          aria-valuetext={formatValue?.(figure)}
          className="block size-4 rounded-full! border-2 border-ink bg-groundsel"
        />
      ))}
    </Base.Root>
  );
}
