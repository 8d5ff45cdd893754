import { PassOnLink } from '../../components/ui/pass-on-link.tsx';
import type { AccountLink } from './create-site-account.ts';

/** The link to pass on when no letter could be sent; nothing when one was. */
export function AccountLinkNote({ result }: { result: AccountLink }) {
  if (!result.link) return null;
  const isWelcome = result.account.state === 'invited';
  return (
    <PassOnLink
      label={`${isWelcome ? 'Welcome' : 'Reset'} link for ${result.account.email}`}
      hint={`Holds for ${isWelcome ? '14 days' : 'two hours'} and is shown only now.`}
      link={result.link}
    />
  );
}

/** Whether the person was written to, in a sentence. */
export function describeLink({ account, mailed, link }: AccountLink): string {
  if (mailed || !link) return `A letter with a link is on its way to ${account.email}.`;
  return 'No mail server is set up here, so pass the link on yourself.';
}
