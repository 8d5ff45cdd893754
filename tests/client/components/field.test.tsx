import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it, vi } from 'vitest';
import { Field } from '../../../client/src/components/ui/field.tsx';
import { NumberInput } from '../../../client/src/components/ui/number-input.tsx';
import { RadioGroup } from '../../../client/src/components/ui/radio-group.tsx';
import { Select } from '../../../client/src/components/ui/select.tsx';
import { TextInput } from '../../../client/src/components/ui/text-input.tsx';

describe('a field', () => {
  it('names its control, and reads hint and error out with it', () => {
    render(
      <Field label="Code" hint="From 1 to 254." error="Code 3 is taken.">
        <TextInput />
      </Field>,
    );
    const input = screen.getByRole('textbox', { name: 'Code' });
    expect(input).toHaveAccessibleDescription('From 1 to 254. Code 3 is taken.');
    expect(input).toBeInvalid();
    expect(screen.getByRole('alert')).toHaveTextContent('Code 3 is taken.');
  });

  it('without an error is valid and has no empty description', () => {
    render(
      <Field label="Code">
        <TextInput />
      </Field>,
    );
    const input = screen.getByRole('textbox', { name: 'Code' });
    expect(input).toBeValid();
    expect(input).not.toHaveAttribute('aria-describedby');
    expect(screen.queryByRole('alert')).toBeNull();
  });

  it('keeps its name and wiring when the label is not drawn', () => {
    render(
      <Field label="Class" isLabelHidden error="Choose one.">
        <Select value={null} onChange={vi.fn()} options={[{ value: 'a', label: 'Saltmarsh' }]} />
      </Field>,
    );
    const select = screen.getByRole('combobox', { name: 'Class' });
    expect(select).toHaveAccessibleDescription('Choose one.');
    expect(select).toHaveAttribute('aria-invalid', 'true');
  });

  it('names a radio group and tells its choice', async () => {
    const choose = vi.fn();
    render(
      <Field label="Count by">
        <RadioGroup
          value="pixel"
          onChange={choose}
          options={[
            { value: 'pixel', label: 'Pixels' },
            { value: 'polygon', label: 'Polygons', hint: 'Each once.' },
          ]}
        />
      </Field>,
    );
    expect(screen.getByRole('radiogroup', { name: 'Count by' })).toBeInTheDocument();
    const polygons = screen.getByRole('radio', { name: 'Polygons' });
    expect(polygons).toHaveAccessibleDescription('Each once.');
    await userEvent.click(polygons);
    expect(choose).toHaveBeenCalledWith('polygon');
  });
});

function Wavelength({ tell }: { tell: (value: number | null) => void }) {
  const [value, setValue] = useState<number | null>(0.86);
  return (
    <Field label="Wavelength">
      <NumberInput
        unit="µm"
        value={value}
        onChange={(next) => {
          setValue(next);
          tell(next);
        }}
      />
    </Field>
  );
}

describe('a number field', () => {
  it('takes figures with point or comma, and never gives on what is no number yet', async () => {
    const tell = vi.fn();
    render(<Wavelength tell={tell} />);
    const input = screen.getByRole('textbox', { name: 'Wavelength' });
    await userEvent.clear(input);
    await userEvent.type(input, '-1,5');
    expect(input).toHaveValue('-1,5');
    expect(tell.mock.lastCall).toEqual([-1.5]);
    for (const [value] of tell.mock.calls) expect(value).not.toBeNaN();
    await userEvent.tab();
    expect(input).toHaveValue('-1.5');
  });

  it('is null when emptied', async () => {
    const tell = vi.fn();
    render(<Wavelength tell={tell} />);
    await userEvent.clear(screen.getByRole('textbox', { name: 'Wavelength' }));
    expect(tell.mock.lastCall).toEqual([null]);
  });
});
