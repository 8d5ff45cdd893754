import { fireEvent, render, screen } from '@testing-library/react';
import { expect, it, vi } from 'vitest';
import { nextShare, SwipeDivider } from '../../../../client/src/components/map/swipe-divider.tsx';

it('is a slider that says what lies on either side, and moves by keys', () => {
  const onChange = vi.fn();
  render(<SwipeDivider share={0.5} onChange={onChange} leftName="Run 1" rightName="Run 2" />);
  const divider = screen.getByRole('slider', { name: 'Divider between Run 1 and Run 2' });
  expect(divider.getAttribute('aria-valuenow')).toBe('50');
  fireEvent.keyDown(divider, { key: 'ArrowRight' });
  expect(onChange).toHaveBeenLastCalledWith(0.52);
  fireEvent.keyDown(divider, { key: 'PageDown' });
  expect(onChange).toHaveBeenLastCalledWith(0.4);
  fireEvent.keyDown(divider, { key: 'a' });
  expect(onChange).toHaveBeenCalledTimes(2);
});

it('stays on the map at either end', () => {
  expect(nextShare(0.01, 'ArrowLeft', false)).toBe(0);
  expect(nextShare(0.95, 'ArrowRight', true)).toBe(1);
  expect(nextShare(0.3, 'Home', false)).toBe(0);
  expect(nextShare(0.3, 'End', false)).toBe(1);
});
