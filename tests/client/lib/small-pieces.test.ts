import { renderHook } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';
import { toCsv } from '../../../client/src/lib/csv.ts';
import { keyName, useKeys } from '../../../client/src/lib/keys.ts';
import { safeReturnPath } from '../../../client/src/lib/paths.ts';
import { fileNameOf } from '../../../client/src/lib/save-file.ts';
import { chooseTheme, readThemeChoice } from '../../../client/src/lib/theme.ts';
import { titleOf } from '../../../client/src/lib/use-title.ts';

const key = (fields: Partial<KeyboardEvent>) => ({
  key: '',
  ctrlKey: false,
  metaKey: false,
  shiftKey: false,
  altKey: false,
  ...fields,
});

describe('keys', () => {
  it('have one name on every keyboard', () => {
    expect(keyName(key({ key: 'P', shiftKey: true }))).toBe('shift+p');
    expect(keyName(key({ key: 'z', metaKey: true }))).toBe('mod+z');
    expect(keyName(key({ key: 'Z', ctrlKey: true, shiftKey: true }))).toBe('mod+shift+z');
    expect(keyName(key({ key: '?', shiftKey: true }))).toBe('?');
    expect(keyName(key({ key: 'Escape' }))).toBe('Escape');
  });

  it('act on the page but not while typing', () => {
    const draw = vi.fn();
    renderHook(() => useKeys({ p: draw }));
    document.body.dispatchEvent(new KeyboardEvent('keydown', { key: 'p', bubbles: true }));
    expect(draw).toHaveBeenCalledTimes(1);
    const input = document.body.appendChild(document.createElement('input'));
    input.dispatchEvent(new KeyboardEvent('keydown', { key: 'p', bubbles: true }));
    expect(draw).toHaveBeenCalledTimes(1);
    input.remove();
  });

  it('rest when switched off', () => {
    const draw = vi.fn();
    renderHook(() => useKeys({ p: draw }, false));
    document.body.dispatchEvent(new KeyboardEvent('keydown', { key: 'p', bubbles: true }));
    expect(draw).not.toHaveBeenCalled();
  });
});

describe('CSV', () => {
  it('quotes what needs quoting, and defuses formulas', () => {
    expect(
      toCsv(
        ['class', 'n'],
        [
          ['Heath, "moor"', 3],
          ['=1+1', null],
        ],
      ),
    ).toBe('\uFEFFclass,n\r\n"Heath, ""moor""",3\r\n\'=1+1,\r\n');
  });

  it('leaves negative numbers alone', () => {
    expect(toCsv(['x'], [[-1.5]])).toBe('\uFEFFx\r\n-1.5\r\n');
  });
});

describe('paths', () => {
  it.each([
    ['/projects/1/runs?x=1', '/projects/1/runs?x=1'],
    ['//elsewhere.example', '/projects'],
    ['/\\elsewhere.example', '/projects'],
    ['https://elsewhere.example', '/projects'],
    ['/sign-in', '/projects'],
    [null, '/projects'],
  ])('after a sign-in, %s leads to %s', (wanted, expected) => {
    expect(safeReturnPath(wanted)).toBe(expected);
  });
});

describe('names', () => {
  it('of tabs put the progress first', () => {
    expect(titleOf(['Runs', 'Isle of Vennory'], 0.429)).toBe('42 % · Runs · Isle of Vennory · Groundsel');
    expect(titleOf([null])).toBe('Groundsel');
  });

  it('of files are plain', () => {
    expect(fileNameOf('Accuracy of run 3: kappa & more')).toBe('accuracy-of-run-3-kappa-more');
    expect(fileNameOf('…')).toBe('groundsel');
  });
});

describe('the theme', () => {
  it('is kept for this browser, and forgotten when left to the system', () => {
    chooseTheme('dark');
    expect(readThemeChoice()).toBe('dark');
    expect(localStorage.getItem('groundsel.theme')).toBe('dark');
    chooseTheme('system');
    expect(readThemeChoice()).toBe('system');
    expect(localStorage.getItem('groundsel.theme')).toBeNull();
  });
});
