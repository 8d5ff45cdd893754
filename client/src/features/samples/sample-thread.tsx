import { useState } from 'react';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import type { RemarkKind, SampleRemark } from '../../../../shared/contracts/sample-review.ts';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { TextArea } from '../../components/ui/text-input.tsx';
import { formatSince } from '../../lib/format-date.ts';
import { useChangeThread, useSampleThread } from './sample-thread-query.ts';

const STEP: Record<RemarkKind, string> = {
  comment: '',
  submitted: 'submitted it',
  withdrawn: 'took it back to draft',
  accepted: 'accepted it',
  returned: 'returned it',
  reopened: 'took the review up again',
  'changed-after-acceptance': 'changed it after it was accepted; it is submitted again',
  settled: 'settled a disagreement',
};

/** What was said about a sample and the steps of its review, with a place to answer. */
export function SampleThread({ sample, viewerId }: { sample: Sample; viewerId: string }) {
  const thread = useSampleThread(sample.projectId, sample.id);
  const change = useChangeThread(sample.projectId, sample.id);
  const [text, setText] = useState('');
  const send = () => change.mutate({ text: text.trim() }, { onSuccess: () => setText('') });
  return (
    <section aria-label="Comments" className="border-t border-line pt-2.5">
      <h3 className="font-medium">
        Comments
        {sample.openRemarks > 0 && <span className="ml-1.5 font-normal text-rust">{sample.openRemarks} open</span>}
      </h3>
      {thread.isError && <ErrorState error={thread.error} onRetry={() => void thread.refetch()} isInline />}
      <ol className="mt-1 space-y-2">
        {thread.data?.remarks.map((remark) => (
          <Remark
            key={remark.id}
            remark={remark}
            isMine={remark.by?.id === viewerId}
            onResolve={
              thread.data.abilities.resolve ? (resolved) => change.mutate({ remarkId: remark.id, resolved }) : undefined
            }
          />
        ))}
      </ol>
      <TextArea
        rows={2}
        maxLength={2000}
        aria-label="Comment"
        placeholder="Ask or answer"
        value={text}
        onChange={(event) => setText(event.target.value)}
        className="mt-2 px-2! py-1! text-sm!"
      />
      {change.error && <ErrorState error={change.error} isInline />}
      {text.trim() && (
        <Button size="sm" className="mt-1" isPending={change.isPending} onClick={send}>
          Add comment
        </Button>
      )}
    </section>
  );
}

interface RemarkProps {
  remark: SampleRemark;
  isMine: boolean;
  onResolve: ((resolved: boolean) => void) | undefined;
}

function Remark({ remark, isMine, onResolve }: RemarkProps) {
  const who = isMine ? 'You' : (remark.by?.name ?? 'Someone no longer here');
  const isQuestion = remark.kind === 'comment' || remark.kind === 'returned';
  return (
    <li className={isQuestion && !remark.resolvedAt ? 'border-l-2 border-groundsel-deep pl-2' : 'pl-2.5'}>
      <p className="text-xs text-ink-soft">
        {who} {STEP[remark.kind]} · {formatSince(remark.at)}
        {remark.resolvedAt && ` · resolved by ${remark.resolvedBy?.name ?? 'someone'}`}
      </p>
      {remark.text && <p className="whitespace-pre-line">{remark.text}</p>}
      {isQuestion && onResolve && (
        <Button size="sm" kind="ghost" className="-ml-2.5" onClick={() => onResolve(!remark.resolvedAt)}>
          {remark.resolvedAt ? 'Open again' : 'Resolve'}
        </Button>
      )}
    </li>
  );
}
