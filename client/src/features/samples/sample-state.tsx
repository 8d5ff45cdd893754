import type { SampleState } from '../../../../shared/contracts/sample.ts';
import { StateTag, type TagTone } from '../../components/ui/state-tag.tsx';

export const SAMPLE_STATE_TEXT: Record<SampleState, string> = {
  draft: 'Draft',
  submitted: 'Submitted',
  accepted: 'Accepted',
  returned: 'Returned',
};
const TONE: Record<SampleState, TagTone> = {
  draft: 'plain',
  submitted: 'working',
  accepted: 'ok',
  returned: 'danger',
};

export function SampleStateTag({ state }: { state: SampleState }) {
  return <StateTag tone={TONE[state]}>{SAMPLE_STATE_TEXT[state]}</StateTag>;
}
