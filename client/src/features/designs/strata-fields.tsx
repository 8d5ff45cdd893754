import { Trash2, Upload } from 'lucide-react';
import { useState } from 'react';
import type { Run } from '../../../../shared/contracts/run.ts';
import { Button } from '../../components/ui/button.tsx';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { Field } from '../../components/ui/field.tsx';
import { RadioGroup } from '../../components/ui/radio-group.tsx';
import { Select } from '../../components/ui/select.tsx';
import { formatCount } from '../../lib/format.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { useProject } from '../../lib/project/project-context.ts';
import type { PlanValues } from './plan-values.ts';
import { ZoneLayerDialog } from './zone-layer-dialog.tsx';
import { useDeleteZoneLayer, useZoneLayers } from './zone-layers.ts';

export interface StrataFieldsProps {
  values: PlanValues;
  onChange: (change: Partial<PlanValues>) => void;
  /** Finished ones. */
  runs: readonly Run[];
}

/** What the strata are: the map's classes, its change from another map, or zones. */
export function StrataFields({ values, onChange, runs }: StrataFieldsProps) {
  const { id } = useProject();
  const layers = useZoneLayers(id);
  const [isAdding, setIsAdding] = useState(false);
  const [isDeleting, setIsDeleting] = useState(false);
  const remove = useDeleteZoneLayer(id);
  const layer = layers.data?.layers.find((one) => one.id === values.layerId);
  const others = runs.filter((run) => run.id !== values.runId);
  return (
    <>
      <RadioGroup<PlanValues['strata']>
        aria-label="Strata"
        value={values.strata}
        onChange={(strata) =>
          onChange({
            strata,
            ...(strata === 'from-to' && { fromRunId: values.fromRunId ?? others[0]?.id ?? null }),
            ...(strata === 'zones' && { layerId: values.layerId ?? layers.data?.layers[0]?.id ?? null }),
          })
        }
        options={[
          { value: 'map-classes', label: 'Classes of the map', hint: 'Each class gets points of its own.' },
          {
            value: 'from-to',
            label: 'Change between two maps',
            hint: 'What stays and what changes: puts points into rare changes.',
            isDisabled: others.length === 0,
          },
          {
            value: 'zones',
            label: 'Zones',
            hint: 'Administrative areas, catchments: each gets points and figures of its own.',
          },
        ]}
      />
      {values.strata === 'from-to' && (
        <Field label="Earlier map" className="max-w-72">
          <Select
            value={values.fromRunId}
            onChange={(fromRunId) => onChange({ fromRunId })}
            options={others.map((run) => ({
              value: run.id,
              label: `Run ${run.number}${run.name ? `, ${run.name}` : ''}`,
            }))}
          />
        </Field>
      )}
      {values.strata === 'zones' && (
        <div className="flex flex-wrap items-end gap-3">
          <Field label="Zone layer" className="w-72">
            <Select
              value={values.layerId}
              onChange={(layerId) => onChange({ layerId })}
              placeholder={layers.data?.layers.length === 0 ? 'None yet' : 'Choose…'}
              options={(layers.data?.layers ?? []).map((layer) => ({
                value: layer.id,
                label: `${layer.name} (${formatCount(layer.zones.length, 'zone')})`,
              }))}
            />
          </Field>
          {layers.data?.abilities.add && (
            <Button icon={<Upload aria-hidden />} onClick={() => setIsAdding(true)}>
              Bring in zones…
            </Button>
          )}
          {layer?.abilities.delete && (
            <Button kind="ghost" icon={<Trash2 aria-hidden />} onClick={() => setIsDeleting(true)}>
              Delete…
            </Button>
          )}
        </div>
      )}
      {layer && (
        <ConfirmDialog
          isOpen={isDeleting}
          onOpenChange={setIsDeleting}
          title={`Delete the zones “${layer.name}”?`}
          loses={[`The outlines of ${formatCount(layer.zones.length, 'zone')}, and estimates zone by zone`]}
          keeps="Designs drawn from them keep their strata and estimates."
          confirmLabel="Delete zones"
          isPending={remove.isPending}
          error={remove.error ? asProblem(remove.error) : null}
          onConfirm={() =>
            remove.mutate(layer.id, {
              onSuccess: () => {
                setIsDeleting(false);
                onChange({ layerId: null });
              },
            })
          }
        />
      )}
      <ZoneLayerDialog
        isOpen={isAdding}
        onOpenChange={setIsAdding}
        onAdded={({ id: layerId }) => onChange({ strata: 'zones', layerId })}
      />
    </>
  );
}
