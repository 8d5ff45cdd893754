import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type Account, accountSchema } from '../../../../shared/contracts/account.ts';
import { Switch } from '../../components/ui/switch.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { fetchJson } from '../../lib/fetch-json.ts';

/** Whether a letter tells when a run ends. */
export function RunLetters({ account }: { account: Account }) {
  const queryClient = useQueryClient();
  const change = useMutation({
    mutationFn: (mailsRunEnd: boolean) =>
      fetchJson('/account', accountSchema, { method: 'PATCH', body: { mailsRunEnd } }),
    onSuccess: (saved) => queryClient.setQueryData(['session'], { account: saved }),
  });
  return (
    <Switch
      label="When a run I started ends"
      hint="Finished or failed; not when it was cancelled."
      isOn={change.isPending ? change.variables : account.mailsRunEnd}
      onChange={(isOn) => change.mutate(isOn, { onError: sayProblem })}
    />
  );
}
