import { useOutletContext } from 'react-router-dom';
import type { Account } from '../../../shared/contracts/account.ts';

/** Who is signed in; for pages inside the signed-in frame, which provides it. */
export function useAccount(): Account {
  return useOutletContext<Account>();
}
