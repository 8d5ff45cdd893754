import { useState } from 'react';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextArea } from '../../components/ui/text-input.tsx';
import { formatCount } from '../../lib/format.ts';

export interface ReturnDialogProps {
  count: number;
  onReturn: (comment: string) => void;
  onClose: () => void;
}

/** Asks what is to be done before samples go back to whoever drew them. */
export function ReturnDialog({ count, onReturn, onClose }: ReturnDialogProps) {
  const [comment, setComment] = useState('');
  const [isMissing, setIsMissing] = useState(false);
  const send = () => {
    if (comment.trim()) onReturn(comment.trim());
    else setIsMissing(true);
  };
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      size="sm"
      title={`Return ${formatCount(count, 'sample')}`}
      description="They go back to whoever drew them, with your comment in their thread."
      footer={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="strong" onClick={send}>
            Return with comment
          </Button>
        </>
      }
    >
      <Field
        label="What is to be done"
        error={
          isMissing && !comment.trim() ? 'Say what is to be done: a sample is returned with a comment.' : undefined
        }
      >
        <TextArea rows={3} maxLength={2000} value={comment} onChange={(event) => setComment(event.target.value)} />
      </Field>
    </Dialog>
  );
}
