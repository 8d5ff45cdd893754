import type { BlockState } from '../../../../shared/contracts/block.ts';
import { StateTag, type TagTone } from '../../components/ui/state-tag.tsx';

export const BLOCK_STATE_TEXT: Record<BlockState, string> = {
  open: 'Open',
  'in-work': 'In work',
  done: 'Done',
  checked: 'Checked',
};
const TONE: Record<BlockState, TagTone> = { open: 'plain', 'in-work': 'working', done: 'beware', checked: 'ok' };

/** Fills of the map; the label at the pointer says the state as well. */
export const BLOCK_STATE_COLOUR: Record<BlockState, string> = {
  open: '#fffdf8',
  'in-work': '#6fa8d6',
  done: '#f2b705',
  checked: '#3f9d7d',
};

export function BlockStateTag({ state }: { state: BlockState }) {
  return <StateTag tone={TONE[state]}>{BLOCK_STATE_TEXT[state]}</StateTag>;
}
