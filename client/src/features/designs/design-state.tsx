import type { Design, DesignState } from '../../../../shared/contracts/reference.ts';
import { StateTag, type TagTone } from '../../components/ui/state-tag.tsx';
import { formatCount } from '../../lib/format.ts';

const STATES: Record<DesignState, { tone: TagTone; text: string }> = {
  draft: { tone: 'plain', text: 'draft' },
  open: { tone: 'working', text: 'being interpreted' },
  adjudicating: { tone: 'beware', text: 'disagreements open' },
  closed: { tone: 'ok', text: 'closed' },
};

export function DesignStateTag({ state }: { state: DesignState }) {
  const { tone, text } = STATES[state];
  return <StateTag tone={tone}>{text}</StateTag>;
}

export function designTitle({ number, name }: Pick<Design, 'number' | 'name'>): string {
  return name ? `Design ${number}, ${name}` : `Design ${number}`;
}

/** Where a design stands, in a sentence. */
export function describeProgress({ state, progress }: Design): string {
  const { points, complete, settled, disputed } = progress;
  switch (state) {
    case 'draft':
      return `${formatCount(points, 'point')} drawn; nobody has seen them yet.`;
    case 'open':
      return `${complete} of ${formatCount(points, 'point')} have all their answers.`;
    case 'adjudicating':
      return disputed > 0
        ? `${formatCount(disputed, 'point')} to decide; ${settled} of ${points} stand.`
        : `All decided; ${settled} of ${formatCount(points, 'point')} have a class.`;
    case 'closed':
      return `${settled} of ${formatCount(points, 'point')} have a reference class.`;
  }
}
