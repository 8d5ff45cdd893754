import { render, screen } from '@testing-library/react';
import { MemoryRouter } from 'react-router-dom';
import { describe, expect, it } from 'vitest';
import { QueueList } from '../../../../client/src/features/queue/queue-list.tsx';
import type { QueueEntry } from '../../../../shared/contracts/queue.ts';

const entry = (change: Partial<QueueEntry>): QueueEntry => ({
  ...{ jobId: 'j', title: 'Run 4', kind: 'run', lane: 'long', runId: null, projectName: null, state: 'queued' },
  ...{ priority: 'normal', isPlaced: false, position: 1, step: '', share: 0, secondsLeft: null },
  ...{ startsInSeconds: 95, queuedAt: new Date().toISOString() },
  ...change,
});

describe('the queue', () => {
  it('says what works, who is next, when each starts, and keeps others’ work apart', () => {
    render(
      <MemoryRouter>
        <QueueList
          projectId="p"
          actionsOf={({ jobId }) => (jobId ? <button type="button">Cancel</button> : null)}
          entries={[
            entry({
              state: 'running',
              position: null,
              jobId: 'k',
              title: 'Run 3',
              step: 'Training trees',
              share: 0.4,
              runId: 'r',
            }),
            entry({ jobId: null, title: 'Work of another project' }),
            entry({ position: 2, priority: 'high', startsInSeconds: null }),
          ]}
        />
      </MemoryRouter>,
    );
    const rows = screen.getAllByRole('listitem').map((row) => row.textContent);
    expect(rows).toHaveLength(3);
    expect(rows[0]).toMatch(/at work.*Run 3.*Training trees.*40/);
    expect(rows[1]).toMatch(/next.*Work of another project.*Starts in about 2.min/);
    expect(rows[2]).toMatch(/place 2.*Run 4.*high priority.*not foreseeable/);
    expect(screen.getAllByRole('button')).toHaveLength(2);
    expect(screen.getByRole('link', { name: 'Run 3' })).toHaveAttribute('href', '/projects/p/runs/r');
  });
});
