import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { describe, expect, it, vi } from 'vitest';
import { AppShell } from '../../../client/src/components/layout/app-shell.tsx';
import { ClassKeys, classDigit } from '../../../client/src/components/layout/class-keys.tsx';
import { PageHeader } from '../../../client/src/components/layout/page-header.tsx';
import { scaleDenominator } from '../../../client/src/components/map/coordinate-readout.tsx';

const showShell = (signOut = vi.fn()) =>
  render(
    <MemoryRouter initialEntries={['/projects/p1/samples']}>
      <AppShell
        project={{
          id: 'p1',
          name: 'Isle of Vennory',
          stages: [
            { id: 'samples', state: 'part', count: 1248 },
            { id: 'overview', state: 'done', count: null },
            { id: 'accuracy', state: 'empty', count: null },
          ],
        }}
        account={{ name: 'Labeller A', note: 'Labeller', isSiteAdmin: false, onSignOut: signOut }}
      >
        <PageHeader title="Sampling desk" progress={0.5} action={<button>Submit block</button>} />
      </AppShell>
    </MemoryRouter>,
  );

describe('the rail', () => {
  it('lists the open stages in the order of the work, with their state in words', () => {
    showShell();
    const nav = screen.getByRole('navigation', { name: 'Stages of the project' });
    const names = within(nav)
      .getAllByRole('link')
      .map((link) => link.textContent);
    expect(names).toEqual(['Overview, done', 'Samples, under way1\u202F248 in all', 'Accuracy, not begun']);
  });

  it('marks the page one is on', () => {
    showShell();
    expect(screen.getByRole('link', { name: /Samples/ })).toHaveAttribute('aria-current', 'page');
    expect(screen.getByRole('link', { name: /Overview/ })).not.toHaveAttribute('aria-current');
  });

  it('begins with a way past it to the page', () => {
    showShell();
    expect(screen.getByRole('link', { name: 'Skip to the page' })).toHaveAttribute('href', '#page');
    expect(screen.getByRole('main')).toHaveAttribute('id', 'page');
  });

  it('signs out from the account menu, and keeps site pages to site administrators', async () => {
    const signOut = vi.fn();
    showShell(signOut);
    await userEvent.click(screen.getByRole('button', { name: 'Account of Labeller A' }));
    expect(screen.queryByRole('menuitem', { name: 'Accounts and storage' })).toBeNull();
    await userEvent.click(screen.getByRole('menuitem', { name: 'Sign out' }));
    expect(signOut).toHaveBeenCalledOnce();
  });

  it('switches the theme without closing the menu', async () => {
    showShell();
    await userEvent.click(screen.getByRole('button', { name: 'Account of Labeller A' }));
    await userEvent.click(screen.getByRole('menuitemradio', { name: 'Dark' }));
    expect(document.documentElement.dataset['theme']).toBe('dark');
    await userEvent.click(screen.getByRole('menuitemradio', { name: 'As the system' }));
    expect(document.documentElement.dataset['theme']).toBeUndefined();
  });
});

describe('the page header', () => {
  it('titles the tab with progress, page and project', () => {
    showShell();
    expect(document.title).toBe('50 % · Sampling desk · Isle of Vennory · Groundsel');
    expect(screen.getByRole('heading', { level: 1, name: 'Sampling desk' })).toBeInTheDocument();
  });
});

describe('the class keys', () => {
  it('carry digit, name and tally, and tell which is on', async () => {
    const select = vi.fn();
    const key = (id: string, name: string, position: number) => ({ id, name, position, colour: '#299785', count: 12 });
    render(
      <ClassKeys
        keys={[key('a', 'Saltmarsh', 2), key('b', 'Built-up', 9)]}
        target={25}
        selectedId="a"
        onSelect={select}
      />,
    );
    const saltmarsh = screen.getByRole('button', { name: /Saltmarsh/ });
    expect(saltmarsh).toHaveAttribute('aria-pressed', 'true');
    expect(saltmarsh).toHaveTextContent('12 of 25');
    await userEvent.click(screen.getByRole('button', { name: /Built-up/ }));
    expect(select).toHaveBeenCalledWith('b');
  });

  it('have the digits 1 to 9 and 0, and none from the eleventh on', () => {
    expect([0, 8, 9, 10].map(classDigit)).toEqual(['1', '9', '0', null]);
  });
});

describe('the map scale', () => {
  it('is the standard scale denominator at the equator', () => {
    // OGC 07-057r7 (WMTS 1.0), annex E.4: GoogleMapsCompatible, zoom 0 is 559082264.03, zoom 10 is 545978.77.
    expect(scaleDenominator(0, 0)).toBe(560_000_000);
    expect(scaleDenominator(0, 10)).toBe(550_000);
  });

  it('halves towards 60 degrees north, as Mercator stretches', () => {
    expect(scaleDenominator(60, 10)).toBe(270_000);
  });
});
