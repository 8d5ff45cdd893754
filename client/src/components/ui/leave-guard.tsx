import { useEffect } from 'react';
import { useBlocker } from 'react-router-dom';
import { ConfirmDialog } from './confirm-dialog.tsx';

interface LeaveGuardProps {
  /** There is something to lose. */
  isOn: boolean;
  /** What is lost, one line: "Your changes to the band table". */
  loses: string;
}

/** Asks before a page with unsaved work is left, by a link as well as by closing the tab. */
export function LeaveGuard({ isOn, loses }: LeaveGuardProps) {
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) => isOn && currentLocation.pathname !== nextLocation.pathname,
  );
  useEffect(() => {
    if (!isOn) return undefined;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [isOn]);
  return (
    <ConfirmDialog
      isOpen={blocker.state === 'blocked'}
      onOpenChange={(isOpen) => !isOpen && blocker.reset?.()}
      title="Leave without saving?"
      loses={[loses]}
      confirmLabel="Leave"
      cancelLabel="Stay here"
      onConfirm={() => blocker.proceed?.()}
    />
  );
}
