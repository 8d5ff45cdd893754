import type { Presence } from '../../../../shared/contracts/presence.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { DraftSlip } from './draft-slip.tsx';
import { MarkedSlip } from './marked-slip.tsx';
import type { useDraftMeasure } from './measure-query.ts';
import { ProbeSlip } from './probe-slip.tsx';
import { SampleSlip } from './sample-slip.tsx';
import type { Desk } from './use-desk.ts';

export interface DeskSlipProps {
  desk: Desk;
  viewerId: string;
  scenes: readonly Scene[];
  /** Who else is at the desk. */
  people: readonly Presence[];
  measure: ReturnType<typeof useDraftMeasure>;
}

/** What is open, on the right edge: the drawing, a pixel, or the selected sample. */
export function DeskSlip({ desk, viewerId, scenes, people, measure }: DeskSlipProps) {
  const { draft, probe, selected, scene, classes } = desk;
  if (draft) {
    return (
      <DraftSlip
        key={draft.id}
        draft={draft}
        classes={classes}
        measure={measure}
        projectId={desk.project.id}
        scene={scene}
        isFromBefore={desk.isFromBefore}
        isSaving={desk.isBusy}
        growth={
          desk.isGrown ? { distance: desk.growDistance, isGrowing: desk.isGrowing, onDistance: desk.growAgain } : null
        }
        error={desk.saveError}
        onChange={desk.changeDraft}
        onSave={() => void desk.save(draft)}
        onDiscard={desk.discard}
      />
    );
  }
  if (probe) {
    return <ProbeSlip projectId={desk.project.id} scene={scene} place={probe} onClose={() => desk.setProbe(null)} />;
  }
  if (!selected) {
    if (desk.marked.length === 0) return null;
    return (
      <MarkedSlip
        samples={desk.marked}
        nWanted={desk.highlightedIds.length}
        classes={desk.byId}
        onSelect={desk.goTo}
        onClose={() => desk.select(null)}
      />
    );
  }
  return (
    <SampleSlip
      sample={selected}
      scene={scenes.find(({ id }) => id === selected.sceneId) ?? scene}
      classes={classes}
      viewerId={viewerId}
      isBusy={desk.isBusy}
      editedBy={people.find(({ editingSampleId }) => editingSampleId === selected.id)?.person.name ?? null}
      shownVersion={desk.version?.versionNumber ?? null}
      onShowVersion={desk.setVersion}
      onRestore={(versionNumber) => void desk.restoreVersion(selected, versionNumber)}
      onEdit={() => desk.edit(selected)}
      onDelete={() => void desk.erase(selected)}
      onClose={() => desk.select(null)}
    />
  );
}
