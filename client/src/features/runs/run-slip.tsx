import { Download } from 'lucide-react';
import type { ReactNode } from 'react';
import { MAP_CAUTIONS } from '../../../../shared/constants/cautions.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { Slip } from '../../components/layout/slip.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { Menu, MenuItem } from '../../components/ui/menu.tsx';
import { apiUrl } from '../../lib/fetch-json.ts';
import { formatNumber } from '../../lib/format.ts';
import { ClassLegend } from './class-legend.tsx';
import { LAYER_NAMES } from './map-choice.ts';
import { RecipeSummary } from './recipe-summary.tsx';

interface RunSlipProps {
  run: Run;
  scene: Scene | null;
  scheme: readonly { id: string; position: number }[];
  /** The accuracy in a line with its link, for those who may read it. */
  accuracy: ReactNode;
}

/** A finished run: legend with areas, accuracy, recipe, notes, digests, downloads. */
export function RunSlip({ run, scene, scheme, accuracy }: RunSlipProps) {
  return (
    <Slip
      title={run.name || `Class map of run ${run.number}`}
      note={
        <>
          Learned from {formatNumber(run.trainingPixels)} pixels of {formatNumber(run.trainingPolygons)} polygons;{' '}
          {formatNumber(run.heldOutPolygons)} polygons held out
        </>
      }
      footer={<Downloads run={run} />}
    >
      {accuracy}
      <ClassLegend run={run} scheme={scheme} />
      <p className="text-xs text-ink-soft">
        Areas by counting map pixels. Where the map errs more one way than the other they are off by as much: they are
        no area estimates.
      </p>
      <Part title="Recipe" isOpen>
        <RecipeSummary run={run} scene={scene} />
      </Part>
      {run.notes.length > 0 && (
        <Part title={`Notes (${run.notes.length})`}>
          <ul className="list-disc space-y-1 pl-4">
            {run.notes.map((note) => (
              <li key={note}>{note}</li>
            ))}
          </ul>
        </Part>
      )}
      <Part title="Digests">
        <p className="text-xs text-ink-soft">
          The same recipe, samples and scene give the same class map, byte for byte. SHA-256 of both:
        </p>
        <Digest name="Samples, classes, study area and bands" value={run.inputSha256} />
        <Digest name="Class map, one byte a pixel" value={run.classMapSha256} />
      </Part>
      <Part title="Before anyone relies on it">
        <ul className="list-disc space-y-1 pl-4">
          {MAP_CAUTIONS.map((caution) => (
            <li key={caution}>{caution}</li>
          ))}
        </ul>
      </Part>
    </Slip>
  );
}

function Part({ title, isOpen = false, children }: { title: string; isOpen?: boolean; children: ReactNode }) {
  return (
    <details open={isOpen} className="border-t border-line pt-2.5">
      <summary className="cursor-pointer font-semibold">{title}</summary>
      <div className="mt-2">{children}</div>
    </details>
  );
}

function Digest({ name, value }: { name: string; value: string | null }) {
  return (
    <div className="mt-1.5">
      <p className="text-xs text-ink-soft">{name}</p>
      <p className="text-xs break-all select-all">{value ?? '–'}</p>
    </div>
  );
}

function Downloads({ run: { id: runId, layers } }: { run: Run }) {
  return (
    <>
      <a href={apiUrl(`/runs/${runId}/class-map.tif`)} download className={buttonClass('strong')}>
        <Download aria-hidden />
        Class map, GeoTIFF
      </a>
      <Menu
        side="top"
        trigger={
          <Button className="grow-0!" aria-label="Choose what to download">
            Files
          </Button>
        }
      >
        <MenuItem href={apiUrl(`/runs/${runId}/class-map.zip`)}>
          Package: map, class names, areas, cautions (ZIP)
        </MenuItem>
        <MenuItem href={apiUrl(`/runs/${runId}/class-map.tif`)}>Class map alone (GeoTIFF)</MenuItem>
        {layers.map((layer) => (
          <MenuItem key={layer} href={apiUrl(`/runs/${runId}/layers/${layer}.tif`)}>
            {LAYER_NAMES[layer]} in percent (GeoTIFF)
          </MenuItem>
        ))}
      </Menu>
    </>
  );
}
