import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { Button } from '../../../client/src/components/ui/button.tsx';
import { Checkbox } from '../../../client/src/components/ui/checkbox.tsx';
import { ConfirmDialog } from '../../../client/src/components/ui/confirm-dialog.tsx';
import { Dialog } from '../../../client/src/components/ui/dialog.tsx';
import { ErrorState } from '../../../client/src/components/ui/error-state.tsx';
import { Figure } from '../../../client/src/components/ui/figure.tsx';
import { IconButton } from '../../../client/src/components/ui/icon-button.tsx';
import { PendingState } from '../../../client/src/components/ui/pending-state.tsx';
import { ProgressBar } from '../../../client/src/components/ui/progress-bar.tsx';
import { Segmented } from '../../../client/src/components/ui/segmented.tsx';
import { Slider } from '../../../client/src/components/ui/slider.tsx';
import { Switch } from '../../../client/src/components/ui/switch.tsx';
import { THIN_SPACE } from '../../../client/src/lib/format.ts';
import { ProblemError } from '../../../client/src/lib/problem-error.ts';

describe('a button', () => {
  it('while pending says so, keeps the focus and takes no second press', async () => {
    const press = vi.fn();
    render(
      <Button isPending pendingLabel="Saving…" onClick={press}>
        Save
      </Button>,
    );
    const button = screen.getByRole('button', { name: 'Saving…' });
    expect(button).toHaveAttribute('aria-busy', 'true');
    await userEvent.click(button);
    expect(press).not.toHaveBeenCalled();
    expect(button).toHaveFocus();
  });

  it('that is pending does not submit its form', async () => {
    const submit = vi.fn((event: { preventDefault(): void }) => event.preventDefault());
    render(
      <form onSubmit={submit}>
        <Button type="submit" isPending>
          Send
        </Button>
      </form>,
    );
    await userEvent.click(screen.getByRole('button'));
    expect(submit).not.toHaveBeenCalled();
  });

  it('that is only a picture has a name and tells whether it is on', () => {
    render(<IconButton label="Snap to edges" icon={<svg />} isOn />);
    expect(screen.getByRole('button', { name: 'Snap to edges' })).toHaveAttribute('aria-pressed', 'true');
  });
});

describe('choices', () => {
  it('of a segmented row: one is always on', async () => {
    const choose = vi.fn();
    render(
      <Segmented
        label="Composite"
        value="natural"
        onChange={choose}
        options={[
          { value: 'natural', label: 'Natural colour' },
          { value: 'infrared', label: 'Colour infrared' },
        ]}
      />,
    );
    await userEvent.click(screen.getByRole('radio', { name: 'Natural colour' }));
    expect(choose).not.toHaveBeenCalled();
    await userEvent.click(screen.getByRole('radio', { name: 'Colour infrared' }));
    expect(choose).toHaveBeenCalledWith('infrared');
  });

  it('of a checkbox may be mixed, and become whole', async () => {
    const change = vi.fn();
    render(<Checkbox label="All bands" isChecked="mixed" onChange={change} />);
    const box = screen.getByRole('checkbox', { name: 'All bands' });
    expect(box).toBePartiallyChecked();
    await userEvent.click(box);
    expect(change).toHaveBeenCalledWith(true);
  });

  it('of a switch take effect by the keyboard too', async () => {
    const change = vi.fn();
    render(<Switch label="Show samples" isOn={false} onChange={change} />);
    screen.getByRole('switch', { name: 'Show samples' }).focus();
    await userEvent.keyboard(' ');
    expect(change).toHaveBeenCalledWith(true);
  });

  it('of a slider move by arrow keys and are read out in their unit', async () => {
    const change = vi.fn();
    render(
      <Slider
        value={[20, 70]}
        onChange={change}
        min={0}
        max={100}
        labels={['Lowest', 'Highest']}
        formatValue={(value) => `${value} %`}
      />,
    );
    const lowest = screen.getByRole('slider', { name: 'Lowest' });
    expect(lowest).toHaveAttribute('aria-valuetext', '20 %');
    lowest.focus();
    await userEvent.keyboard('{ArrowRight}');
    expect(change).toHaveBeenCalledWith([21, 70]);
  });
});

describe('dialogs', () => {
  it('are named, described and left by Escape', async () => {
    const change = vi.fn();
    render(
      <Dialog isOpen onOpenChange={change} title="Invite to the project" description="They get a link.">
        <input aria-label="E-mail" />
      </Dialog>,
    );
    expect(screen.getByRole('textbox', { name: 'E-mail' })).toHaveFocus();
    expect(screen.getByRole('dialog', { name: 'Invite to the project' })).toHaveAccessibleDescription(
      'They get a link.',
    );
    await userEvent.keyboard('{Escape}');
    expect(change).toHaveBeenCalledWith(false);
  });

  it('that ask before a loss say what is lost and start on the way out', async () => {
    const confirm = vi.fn();
    render(
      <ConfirmDialog
        isOpen
        onOpenChange={vi.fn()}
        title="Delete the class Saltmarsh?"
        loses={['12 samples drawn by 2 people']}
        confirmLabel="Delete class"
        typeToConfirm="Saltmarsh"
        onConfirm={confirm}
      />,
    );
    const dialog = screen.getByRole('alertdialog', { name: 'Delete the class Saltmarsh?' });
    expect(dialog).toHaveAccessibleDescription(expect.stringContaining('12 samples drawn by 2 people'));
    expect(screen.getByRole('button', { name: 'Keep it' })).toHaveFocus();
    const act = screen.getByRole('button', { name: 'Delete class' });
    expect(act).toBeDisabled();
    await userEvent.type(screen.getByRole('textbox'), 'Saltmarsh');
    await userEvent.click(act);
    expect(confirm).toHaveBeenCalledOnce();
  });
});

describe('states', () => {
  it('of error say what was found, what is wanted and what to do', async () => {
    const retry = vi.fn();
    const error = new ProblemError({
      status: 422,
      code: 'no-crs',
      title: 'This file is no scene',
      found: 'no reference system',
      wanted: 'a projected one',
      advice: 'Assign it and upload again.',
      errors: [{ path: 'file', message: 'b4.tif' }],
    });
    render(<ErrorState error={error} onRetry={retry} />);
    const alert = screen.getByRole('alert');
    for (const text of [
      'This file is no scene',
      'no reference system',
      'a projected one',
      'Assign it and upload again.',
    ]) {
      expect(alert).toHaveTextContent(text);
    }
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }));
    expect(retry).toHaveBeenCalledOnce();
  });

  it('of waiting are read out', () => {
    render(<PendingState label="Loading samples" shape="table" />);
    expect(screen.getByRole('status')).toHaveTextContent('Loading samples');
  });

  it('of progress carry counts and time left', () => {
    render(<ProgressBar label="Classifying" done={143} total={240} unit="blocks" secondsLeft={96} />);
    const bar = screen.getByRole('progressbar', { name: 'Classifying' });
    expect(bar).toHaveAttribute('aria-valuenow', '59');
    expect(bar).toHaveAttribute('aria-valuetext', `143 of 240 blocks, about 2${THIN_SPACE}min left`);
  });

  it('of progress survive a total of nothing', () => {
    render(<ProgressBar label="Classifying" done={0} total={0} />);
    expect(screen.getByRole('progressbar')).toHaveAttribute('aria-valuenow', '0');
  });

  it('of a figure tell how it was obtained', async () => {
    render(<Figure label="overall accuracy" value={0.912} halfWidth={0.021} decimals={3} how="From 640 points." />);
    expect(screen.getByText('0.912 ± 0.021')).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'how?' }));
    expect(screen.getByRole('dialog', { name: 'How was this obtained?' })).toHaveTextContent('From 640 points.');
  });
});
