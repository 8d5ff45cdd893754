import { useState } from 'react';
import type { CellPoint, Design } from '../../../../shared/contracts/reference.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import { ContextViews } from '../../components/place/context-views.tsx';
import { PointSpectra } from '../../components/place/point-spectra.tsx';
import { useContextViews } from '../../components/place/use-context-views.ts';
import { Section } from '../../components/layout/reading-page.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { Select } from '../../components/ui/select.tsx';
import { useZoneLayers } from '../../features/designs/zone-layers.ts';
import { designTitle } from '../../features/designs/design-state.tsx';
import { EstimateReport } from '../../features/estimates/estimate-report.tsx';
import { useEstimates } from '../../features/estimates/get-estimates.ts';
import { KappaComparisonPart } from '../../features/estimates/kappa-comparison-part.tsx';
import { MapComparisonPart } from '../../features/estimates/map-comparison-part.tsx';
import { ZonePart } from '../../features/estimates/zone-part.tsx';
import { formatDateTime } from '../../lib/format-date.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';

export interface DesignEstimatesProps {
  design: Design;
  positions: ReadonlyMap<string, number>;
  /** Other finished runs, for a comparison on the same points. */
  others: readonly Run[];
  /** Other closed designs, for kappas of independent points. */
  otherDesigns: readonly Design[];
}

/** The estimates of a closed design, and other maps on the same points. */
export function DesignEstimates({ design, positions, others, otherDesigns }: DesignEstimatesProps) {
  const { id } = useProject();
  const estimates = useEstimates(id, design.id);
  if (estimates.isPending) return <PendingState label="Computing the estimates" rows={6} />;
  if (estimates.isError) return <ErrorState error={estimates.error} onRetry={() => void estimates.refetch()} />;
  const closedAt = design.closedAt ? `, closed ${formatDateTime(design.closedAt)}` : '';
  return (
    <>
      <EstimateReport
        key={design.id}
        projectId={id}
        estimates={estimates.data}
        designLine={`${designTitle(design)}${closedAt}`}
        positions={positions}
        renderPlace={(point) => <PlaceOfPoint key={point.id} point={point} />}
      />
      <ByZone design={design} />
      {others.length > 0 && (
        <Section title="Another map on the same points" className="mt-9">
          <MapComparisonPart projectId={id} designId={design.id} runs={others} />
        </Section>
      )}
      {otherDesigns.length > 0 && (
        <Section title="Kappas of independent designs" className="mt-9">
          <KappaComparisonPart design={design} others={otherDesigns} />
        </Section>
      )}
    </>
  );
}

function ByZone({ design }: { design: Design }) {
  const { id } = useProject();
  const layers = useZoneLayers(id);
  const [chosenId, setChosenId] = useState<string | null>(null);
  const known = layers.data?.layers ?? [];
  const layer = known.find((one) => one.id === chosenId) ?? known[0];
  if (!layer) return null;
  return (
    <Section
      title="Zone by zone"
      className="mt-9"
      action={
        known.length > 1 && (
          <Select
            aria-label="Zone layer"
            size="sm"
            className="w-auto! max-w-64"
            value={layer.id}
            onChange={setChosenId}
            options={known.map((one) => ({ value: one.id, label: one.name }))}
          />
        )
      }
    >
      <ZonePart projectId={id} designId={design.id} layerId={layer.id} />
    </Section>
  );
}

function PlaceOfPoint({ point }: { point: CellPoint }) {
  const { id } = useProject();
  const scenes = useScenes(id);
  const ready = scenes.data?.filter(({ state }) => state === 'ready') ?? [];
  const { shown } = useContextViews(id, ready);
  if (!scenes.data) return <PendingState label="Loading the scenes" shape="block" />;
  return (
    <div className="space-y-3">
      <div className="h-52">
        <ContextViews projectId={id} place={point} views={shown.slice(0, 2)} zoomSteps={-1} />
      </div>
      <PointSpectra projectId={id} scenes={ready} outline={point.outline} outline3={point.outline3} />
    </div>
  );
}
