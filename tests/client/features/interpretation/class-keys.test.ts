import { describe, expect, it } from 'vitest';
import { classKeys, takesEnter } from '../../../../client/src/features/interpretation/class-keys.ts';

const classes = Array.from({ length: 23 }, (_, i) => ({
  id: `c${i}`,
  name: `Class ${i}`,
  colour: '#888',
  position: i,
}));
const press = new KeyboardEvent('keydown');

/** What the digits choose, and where PgDn and PgUp lead, from `firstDigit`. */
function tryKeys(firstDigit: number) {
  const chosen: string[] = [];
  const turned: number[] = [];
  const keys = classKeys(
    classes,
    firstDigit,
    (id) => chosen.push(id),
    (first) => turned.push(first),
  );
  for (const digit of '1234567890') keys[digit]?.(press);
  keys.PageDown!(press);
  keys.PageUp!(press);
  return { chosen, turned };
}

describe('keys of the classes', () => {
  it('reach ten classes in the order of the list, 0 being the tenth', () => {
    expect(tryKeys(0).chosen).toEqual(classes.slice(0, 10).map(({ id }) => id));
  });

  it('reach every class by turning to the next and the previous ten, and stop at the ends', () => {
    expect(tryKeys(0).turned).toEqual([10, 0]);
    expect(tryKeys(10).chosen).toEqual(classes.slice(10, 20).map(({ id }) => id));
    expect(tryKeys(10).turned).toEqual([20, 0]);
    expect(tryKeys(20).chosen).toEqual(['c20', 'c21', 'c22']);
    expect(tryKeys(20).turned).toEqual([10]);
  });
});

describe('a digit', () => {
  it('takes the focus from a tool pressed before, so that Enter saves', () => {
    document.body.innerHTML = '<button>Closer</button>';
    document.querySelector('button')!.focus();
    expect(document.activeElement?.tagName).toBe('BUTTON');
    tryKeys(0);
    expect(document.activeElement).toBe(document.body);
  });
});

describe('Enter', () => {
  const at = (html: string) => {
    document.body.innerHTML = html;
    return { target: document.querySelector('[data-at]') } as unknown as KeyboardEvent;
  };

  it('belongs to a button or link with the focus, but to the page on what is already chosen', () => {
    expect(takesEnter(at('<button data-at>Leave</button>'))).toBe(true);
    expect(takesEnter(at('<a href="/"><span data-at>Design</span></a>'))).toBe(true);
    expect(takesEnter(at('<button aria-pressed="true" data-at>Arable</button>'))).toBe(false);
    expect(takesEnter(at('<button role="radio" aria-checked="true" data-at>Sure</button>'))).toBe(false);
    expect(takesEnter(at('<h2 data-at>Point 3</h2>'))).toBe(false);
  });
});
