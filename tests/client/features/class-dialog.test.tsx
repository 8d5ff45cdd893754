import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { LandClass } from '../../../shared/contracts/land-class.ts';
import { ClassDialog } from '../../../client/src/features/classes/class-dialog.tsx';

const heath: LandClass = {
  id: 'a3f0a3a4-6f5c-4f10-9d3b-7f2a4c1f9a01',
  projectId: 'a3f0a3a4-6f5c-4f10-9d3b-7f2a4c1f9a02',
  code: 6,
  name: 'Heath',
  colour: '#A85AA4',
  definition: '',
  position: 0,
  sampleCount: 4,
  version: 1,
};
const arable: LandClass = {
  ...heath,
  id: 'a3f0a3a4-6f5c-4f10-9d3b-7f2a4c1f9a03',
  code: 8,
  name: 'Arable',
  position: 1,
};

interface Sent {
  method: string;
  path: string;
  body: Record<string, unknown>;
}

/** Answers changes one after the other and keeps what was sent. */
function answerWith(...answers: { status: number; body: unknown }[]): Sent[] {
  const sent: Sent[] = [];
  vi.stubGlobal(
    'fetch',
    vi.fn((path: string, init: RequestInit) => {
      if (init.method === 'GET') return Promise.resolve(new Response('{"classes":[]}'));
      sent.push({
        method: init.method ?? '',
        path,
        body: JSON.parse(typeof init.body === 'string' ? init.body : '{}') as Record<string, unknown>,
      });
      const answer = answers.shift();
      if (!answer) throw new Error('one change more than expected');
      return Promise.resolve(new Response(JSON.stringify(answer.body), { status: answer.status }));
    }),
  );
  return sent;
}

function open(landClass: LandClass | null, onClose = vi.fn()) {
  render(
    <QueryClientProvider client={new QueryClient()}>
      <ClassDialog projectId={heath.projectId} classes={[heath, arable]} landClass={landClass} onClose={onClose} />
    </QueryClientProvider>,
  );
  return onClose;
}

afterEach(() => vi.unstubAllGlobals());

describe('the form of a class', () => {
  it('starts a new class with the next free code and colour, and goes on after adding', async () => {
    const sent = answerWith({ status: 201, body: { ...arable, id: heath.projectId, code: 9, name: 'Bare rock' } });
    open(null);
    expect(screen.getByLabelText('Code')).toHaveValue('9');
    await userEvent.type(screen.getByLabelText('Name'), 'Bare rock');
    await userEvent.click(screen.getByRole('button', { name: 'Add class' }));
    await screen.findByText('Added Bare rock.');
    expect(sent[0]?.body).toEqual({ code: 9, name: 'Bare rock', colour: '#294483', definition: '' });
    expect(screen.getByLabelText('Code')).toHaveValue('10');
    expect(screen.getByLabelText('Name')).toHaveValue('');
  });

  it('refuses a code another class has, and an empty one, without asking the server', async () => {
    const sent = answerWith();
    open(heath);
    await userEvent.clear(screen.getByLabelText('Code'));
    await userEvent.type(screen.getByLabelText('Code'), '8');
    await userEvent.click(screen.getByRole('button', { name: 'Save class' }));
    expect(await screen.findByText('Arable has the code 8.')).toBeVisible();
    await userEvent.clear(screen.getByLabelText('Code'));
    await userEvent.click(screen.getByRole('button', { name: 'Save class' }));
    expect(await screen.findByText('Type a code from 1 to 254.')).toBeVisible();
    expect(sent).toEqual([]);
  });

  it('shows both versions when someone else saved first, and saves over theirs only when told to', async () => {
    const theirs = { ...heath, version: 2, definition: 'Dwarf shrubs.' };
    const problem = {
      type: 'urn:groundsel:problem:stale-version',
      title: 'Someone else changed it.',
      status: 409,
      code: 'stale-version',
      current: theirs,
    };
    const sent = answerWith({ status: 409, body: problem }, { status: 200, body: { ...theirs, version: 3 } });
    const onClose = open(heath);
    await userEvent.type(screen.getByLabelText(/^Definition/), 'Heather over half.');
    await userEvent.click(screen.getByRole('button', { name: 'Save class' }));
    expect(await screen.findByText('Dwarf shrubs.')).toBeVisible();
    expect(screen.getByRole('cell', { name: 'Heather over half.' })).toBeVisible();
    expect(screen.getByRole('button', { name: 'Save class' })).toBeDisabled();
    expect(onClose).not.toHaveBeenCalled();
    await userEvent.click(screen.getByRole('button', { name: 'Save mine over it' }));
    await waitFor(() => expect(onClose).toHaveBeenCalled());
    expect(sent.map(({ body }) => [body['version'], body['definition']])).toEqual([
      [1, 'Heather over half.'],
      [2, 'Heather over half.'],
    ]);
  });

  it('takes their version into the form when told to', async () => {
    const theirs = { ...heath, version: 2, name: 'Heath and moor' };
    const problem = { type: 'x', title: 'Changed.', status: 409, code: 'stale-version', current: theirs };
    answerWith({ status: 409, body: problem });
    open(heath);
    await userEvent.type(screen.getByLabelText('Name'), 'land');
    await userEvent.click(screen.getByRole('button', { name: 'Save class' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Take theirs' }));
    expect(screen.getByLabelText('Name')).toHaveValue('Heath and moor');
    expect(screen.getByRole('button', { name: 'Save class' })).toBeEnabled();
  });
});
