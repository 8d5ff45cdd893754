import type { JobPriority } from '../../../../shared/contracts/job.ts';
import { Select } from '../../components/ui/select.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { useSetPriority } from './queue-queries.ts';

const OPTIONS: readonly { value: JobPriority; label: string }[] = [
  { value: 'high', label: 'High priority' },
  { value: 'normal', label: 'Normal priority' },
  { value: 'low', label: 'Low priority' },
];

interface PriorityChoiceProps {
  projectId: string;
  jobId: string;
  title: string;
  priority: JobPriority;
}

/** Which of a project's waiting jobs goes first. */
export function PriorityChoice({ projectId, jobId, title, priority }: PriorityChoiceProps) {
  const change = useSetPriority(projectId);
  return (
    <Select
      aria-label={`Priority of ${title}`}
      size="sm"
      value={priority}
      options={OPTIONS}
      onChange={(next) => change.mutate({ jobId, priority: next as JobPriority }, { onError: sayProblem })}
    />
  );
}
