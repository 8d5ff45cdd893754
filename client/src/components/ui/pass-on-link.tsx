import { Check, Copy } from 'lucide-react';
import { useState } from 'react';
import { Button } from './button.tsx';
import { Field } from './field.tsx';
import { sayProblem } from './toaster.tsx';
import { TextInput } from './text-input.tsx';

export interface PassOnLinkProps {
  /** What it opens: "Welcome link for Mara Quill". */
  label: string;
  link: string;
  /** How long it holds, and what it lets its holder do. */
  hint?: string;
}

/** A secret link shown once, to be passed on by hand. */
export function PassOnLink({ label, link, hint }: PassOnLinkProps) {
  const [isCopied, setIsCopied] = useState(false);
  const copy = () => {
    navigator.clipboard.writeText(link).then(() => setIsCopied(true), sayProblem);
  };
  return (
    <div className="flex items-end gap-2">
      <Field label={label} hint={hint} className="min-w-0 grow">
        <TextInput readOnly value={link} onFocus={(event) => event.target.select()} />
      </Field>
      <Button icon={isCopied ? <Check /> : <Copy />} onClick={copy}>
        <span aria-live="polite">{isCopied ? 'Copied' : 'Copy'}</span>
      </Button>
    </div>
  );
}
