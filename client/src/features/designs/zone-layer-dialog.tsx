import { useState } from 'react';
import type { ZoneLayer } from '../../../../shared/contracts/zone.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatCount } from '../../lib/format.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useAddZoneLayer } from './zone-layers.ts';

export interface ZoneLayerDialogProps {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  onAdded: (layer: ZoneLayer) => void;
}

/** Brings in zones from a vector file. */
export function ZoneLayerDialog({ isOpen, onOpenChange, onAdded }: ZoneLayerDialogProps) {
  const { id } = useProject();
  const add = useAddZoneLayer(id);
  const [file, setFile] = useState<File | null>(null);
  const [name, setName] = useState('');
  const [nameField, setNameField] = useState('');
  const send = () => {
    if (!file) return;
    add.mutate(
      { file, name: name.trim(), nameField: nameField.trim() },
      {
        onSuccess: (layer) => {
          sayDone(`${formatCount(layer.zones.length, 'zone')} brought in`);
          onOpenChange(false);
          onAdded(layer);
        },
      },
    );
  };
  return (
    <Dialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title="Bring in zones"
      description="Polygons in a GeoJSON, GeoPackage, KML or zipped Shapefile, in any reference system it names. Features of the same name become one zone."
      footer={
        <>
          <Button onClick={() => onOpenChange(false)}>Leave</Button>
          <Button kind="primary" onClick={send} disabled={!file} isPending={add.isPending} pendingLabel="Reading…">
            Bring in zones
          </Button>
        </>
      }
    >
      <div className="space-y-4">
        <input
          type="file"
          accept=".gpkg,.geojson,.json,.kml,.zip"
          aria-label="File with zones"
          className="block w-full text-sm"
          onChange={(event) => setFile(event.target.files?.[0] ?? null)}
        />
        <Field label="Name" isOptional hint="The file’s where left empty.">
          <TextInput value={name} maxLength={120} onChange={(event) => setName(event.target.value)} />
        </Field>
        <Field label="Field with the names" isOptional hint="The first field of text where left empty.">
          <TextInput value={nameField} maxLength={120} onChange={(event) => setNameField(event.target.value)} />
        </Field>
        {add.error && <ErrorState error={add.error} isInline />}
      </div>
    </Dialog>
  );
}
