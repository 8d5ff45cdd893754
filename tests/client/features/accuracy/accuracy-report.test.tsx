import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { AccuracyReport } from '../../../../client/src/features/accuracy/accuracy-report.tsx';
import { THIN_SPACE } from '../../../../client/src/lib/format.ts';
import type { Accuracy } from '../../../../shared/contracts/accuracy.ts';
import { CLASS_IDS, RUN_ID, makeAccuracy } from '../../../fixtures/accuracy-of-run.ts';

afterEach(() => vi.unstubAllGlobals());

function show(overrides: Partial<Accuracy> = {}, target: number | null = null) {
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <MemoryRouter>
        <AccuracyReport
          projectId="p1"
          accuracy={makeAccuracy(overrides)}
          runLine="Run 3"
          runNumber={3}
          target={target}
          scheme={[]}
        />
      </MemoryRouter>
    </QueryClientProvider>,
  );
}

const figuresOf = (name: string) =>
  within(screen.getByRole('table', { name: 'Figures of each class' }))
    .getAllByRole('row')
    .find((row) => row.textContent.includes(name))!.textContent;

describe('the accuracy report', () => {
  it('prints an undefined figure as undefined, with why', () => {
    show();
    const rock = figuresOf('Bare rock');
    expect(rock).toContain('undefinedno held-out pixel is mapped as it');
    expect(rock).toContain('undefineduser’s accuracy is undefined');
    expect(document.body.textContent).not.toContain('NaN');
  });

  it('prints a figure that is 0 as 0, not as undefined', () => {
    show();
    expect(figuresOf('Bare rock')).toContain(`0${THIN_SPACE}%no interval`);
  });

  it('gives each class its interval', () => {
    show();
    expect(figuresOf('Arable')).toContain(`85${THIN_SPACE}%75–94`);
  });

  it('says undefined for the whole when no unit is mapped', () => {
    const none = { value: null, low: null, high: null };
    show({
      overall: { ...none, method: 'm' },
      kappa: { ...none, standardError: null, caution: 'c' },
      quantityDisagreement: null,
      allocationDisagreement: null,
      matrix: Array.from({ length: 4 }, () => [0, 0, 0, 0]),
      total: 0,
    });
    expect(screen.getByText('undefined', { selector: 'mark' })).toBeInTheDocument();
    expect(screen.getAllByText('undefined', { selector: 'p' })).toHaveLength(4);
    expect(document.body.innerHTML).not.toContain('NaN');
  });

  it('says plainly that it describes the samples and not the map', () => {
    show();
    expect(
      screen.getByText(/These figures describe the samples; they do not estimate the accuracy of the map\./),
    ).toBeInTheDocument();
  });

  it('holds the overall accuracy against the target of the project', () => {
    show({}, 0.95);
    expect(screen.getByText('Uncertain')).toBeInTheDocument();
  });

  it('keeps quiet of a target nobody set', () => {
    show();
    expect(screen.queryByText(/Target:/)).toBeNull();
  });

  it('tells how it was computed on asking', async () => {
    show();
    await userEvent.click(screen.getByRole('button', { name: 'How was this computed?' }));
    const popover = screen.getByRole('dialog', { name: 'How was this computed?' });
    expect(popover).toHaveTextContent('Held-out polygons37');
    expect(popover).toHaveTextContent('Polygons taken as clusters.');
    // 2 arable pixels were left without a class: in no figure, and said.
    expect(popover).toHaveTextContent(/in no figure2.pixels/);
  });

  it('lists the samples behind a pressed cell, with their way to the map', async () => {
    const ask = vi.fn((_url: string) =>
      Promise.resolve(
        Response.json({
          samples: [
            { sampleId: CLASS_IDS.water, number: 41, pixels: 12, pixelsOfSample: 30, stillThere: true },
            { sampleId: CLASS_IDS.rock, number: 17, pixels: 3, pixelsOfSample: 9, stillThere: false },
          ],
        }),
      ),
    );
    vi.stubGlobal('fetch', ask);
    show();
    await userEvent.click(screen.getByRole('button', { name: /^mapped Arable, reference Improved pasture/ }));
    const panel = screen.getByRole('region', { name: 'Mapped as Arable, really Improved pasture' });
    const link = await within(panel).findByRole('link', { name: 'Sample 41' });
    expect(link).toHaveAttribute('href', `/projects/p1/samples?samples=${CLASS_IDS.water}`);
    expect(panel).toHaveTextContent(/12 of 30.pixels mapped as Arable/);
    expect(within(panel).queryByRole('link', { name: 'Sample 17' })).toBeNull();
    expect(panel).toHaveTextContent('Sample 17 (deleted since)');
    expect(ask.mock.calls[0]?.[0]).toBe(
      `/api/v1/runs/${RUN_ID}/accuracy/cell?unit=pixel&mapped=${CLASS_IDS.arable}&reference=${CLASS_IDS.pasture}`,
    );
  });

  it('asks nothing for an empty cell', async () => {
    const ask = vi.fn();
    vi.stubGlobal('fetch', ask);
    show();
    await userEvent.click(screen.getByRole('button', { name: /^mapped Open water, reference Arable/ }));
    expect(screen.getByText('No held-out sample is behind this cell.')).toBeInTheDocument();
    expect(ask).not.toHaveBeenCalled();
  });
});
