import { ChevronDown, ChevronRight } from 'lucide-react';
import { useState } from 'react';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Sample, SampleVersion } from '../../../../shared/contracts/sample.ts';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatSince } from '../../lib/format-date.ts';
import { formatCount } from '../../lib/format.ts';
import { useSampleHistory } from './sample-history-query.ts';
import { describeVersion } from './version-change.ts';

export interface SampleHistoryProps {
  sample: Sample;
  classes: readonly LandClass[];
  viewerId: string;
  isBusy: boolean;
  shownVersion: number | null;
  onShowVersion: (version: SampleVersion | null) => void;
  onRestore: (versionNumber: number) => void;
}

/** Every version of a sample: who, when, what changed; its outline on the map, and the way back to it. */
export function SampleHistory(props: SampleHistoryProps) {
  const { sample, onShowVersion } = props;
  const [isOpen, setIsOpen] = useState(false);
  const toggle = () => {
    if (isOpen) onShowVersion(null);
    setIsOpen(!isOpen);
  };
  const Chevron = isOpen ? ChevronDown : ChevronRight;
  return (
    <section aria-label="History" className="border-t border-line pt-1.5">
      <button
        type="button"
        aria-expanded={isOpen}
        onClick={toggle}
        className="flex w-full items-center gap-1 py-1 text-left font-medium"
      >
        <Chevron aria-hidden className="-ml-0.5 size-4 text-ink-soft" />
        History
        <span className="ml-auto font-normal text-ink-soft">{formatCount(sample.version, 'version')}</span>
      </button>
      {isOpen && <Versions {...props} />}
    </section>
  );
}

function Versions({ sample, classes, viewerId, isBusy, shownVersion, onShowVersion, onRestore }: SampleHistoryProps) {
  const history = useSampleHistory(sample.projectId, sample.id);
  if (history.isPending) return <PendingState label="Loading the history" rows={3} />;
  if (history.isError) return <ErrorState error={history.error} onRetry={() => void history.refetch()} isInline />;
  return (
    <ol className="mt-1 space-y-2.5 border-l-2 border-line pl-3">
      {history.data.map((version, index) => {
        const isStanding = version.versionNumber === sample.version;
        const isShown = version.versionNumber === shownVersion;
        return (
          <li key={version.versionNumber}>
            <p>{describeVersion(version, history.data[index + 1], classes)}</p>
            <p className="text-xs text-ink-soft">
              Version {version.versionNumber} ·{' '}
              {version.by?.id === viewerId ? 'you' : (version.by?.name ?? 'someone no longer here')},{' '}
              {formatSince(version.at)}
            </p>
            {!isStanding && version.change !== 'deleted' && (
              <p className="mt-1 flex gap-1.5">
                <Button
                  size="sm"
                  kind={isShown ? 'strong' : 'secondary'}
                  aria-pressed={isShown}
                  onClick={() => onShowVersion(isShown ? null : version)}
                >
                  {isShown ? 'On the map' : 'Show on the map'}
                </Button>
                {sample.abilities.edit && (
                  <Button size="sm" kind="ghost" isPending={isBusy} onClick={() => onRestore(version.versionNumber)}>
                    Restore
                  </Button>
                )}
              </p>
            )}
          </li>
        );
      })}
    </ol>
  );
}
