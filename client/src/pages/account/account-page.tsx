import type { ReactNode } from 'react';
import { useNavigate, useOutletContext } from 'react-router-dom';
import type { Account } from '../../../../shared/contracts/account.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { DeviceList } from '../../features/account/device-list.tsx';
import { NameForm } from '../../features/account/name-form.tsx';
import { PasswordForm } from '../../features/account/password-form.tsx';
import { RunLetters } from '../../features/account/run-letters.tsx';
import { ThemeChoiceField } from '../../features/account/theme-choice.tsx';
import { formatDate } from '../../lib/format-date.ts';
import { paths } from '../../lib/paths.ts';

/** The viewer's own account. */
export function AccountPage() {
  const account = useOutletContext<Account>();
  const navigate = useNavigate();
  return (
    <ReadingPage
      header={<PageHeader title="Your account" crumb={`${account.email} · since ${formatDate(account.createdAt)}`} />}
    >
      <div className="max-w-4xl">
        <Part title="Name" note="How you appear in every project you are in.">
          <NameForm account={account} />
        </Part>
        <Part title="Password" note="Changing it signs out every browser but this one.">
          <PasswordForm />
        </Part>
        <Part
          title="Signed-in browsers"
          note="If one of these is not yours, change your password and sign out everywhere."
        >
          <DeviceList onSignedOut={() => void navigate(paths.signIn(), { replace: true })} />
        </Part>
        <Part title="Letters" note="Sent where the server has a mail server to send through.">
          <RunLetters account={account} />
        </Part>
        <Part title="Theme" note="Kept in this browser only.">
          <ThemeChoiceField />
        </Part>
      </div>
    </ReadingPage>
  );
}

/** A part of the page: what it is about at the left, its form at the right. */
function Part({ title, note, children }: { title: string; note: string; children: ReactNode }) {
  return (
    <section className="grid gap-x-12 gap-y-3 border-b border-line py-7 first:pt-1 last:border-b-0 md:grid-cols-[16rem_minmax(0,26rem)]">
      <div>
        <h2 className="text-lg font-semibold">{title}</h2>
        <p className="text-sm text-ink-soft">{note}</p>
      </div>
      <div>{children}</div>
    </section>
  );
}
