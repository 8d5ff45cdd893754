import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import type { changePasswordSchema } from '../../../../shared/contracts/account.ts';
import { sendRequest } from '../../lib/fetch-json.ts';
import { deviceListQuery } from './list-devices.ts';

export type PasswordChange = z.infer<typeof changePasswordSchema>;

const changePassword = (body: PasswordChange) => sendRequest('/account/password', { method: 'PUT', body });

/** Changes the password; the server signs every other browser out. */
export function useChangePassword() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: changePassword,
    onSuccess: () => queryClient.invalidateQueries({ queryKey: deviceListQuery().queryKey }),
  });
}
