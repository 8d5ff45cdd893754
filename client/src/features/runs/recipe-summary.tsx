import type { ReactNode } from 'react';
import { BAND_ROLE_NAME } from '../../../../shared/constants/bands.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { formatDateTime } from '../../lib/format-date.ts';
import { formatNumber, formatPercent } from '../../lib/format.ts';
import { CLASSIFIER_NAME, listClassifierSettings, SAMPLE_STATE_NAME } from './recipe-text.ts';

/** Everything the run was made by. */
export function RecipeSummary({ run, scene }: { run: Run; scene: Scene | null }) {
  const { recipe } = run;
  const facts: { name: string; value: ReactNode }[] = [
    { name: 'Scene', value: run.sceneName },
    { name: 'Bands', value: describeBands(recipe.bandIds, scene) },
    { name: 'Classifier', value: CLASSIFIER_NAME[recipe.classifier.kind] },
    ...listClassifierSettings(recipe.classifier),
    ...(recipe.minShare > 0 ? [{ name: 'Unclassified', value: `below ${formatPercent(recipe.minShare)}` }] : []),
    { name: 'Samples', value: recipe.sampleStates.map((state) => SAMPLE_STATE_NAME[state].toLowerCase()).join(', ') },
    { name: 'Held out', value: `${formatPercent(recipe.heldOutShare)} of each class’s polygons` },
    { name: 'Pixels a class', value: `at most ${formatNumber(recipe.maxPixelsPerClass)}` },
    { name: 'Seed', value: recipe.seed },
    { name: 'Started', value: `${formatDateTime(run.createdAt)}${run.startedBy ? `, ${run.startedBy.name}` : ''}` },
  ];
  return (
    <>
      {run.note && <p className="mb-2 whitespace-pre-line">{run.note}</p>}
      <dl className="grid grid-cols-[minmax(6.5rem,auto)_minmax(0,1fr)] gap-x-4 gap-y-1">
        {facts.map((fact) => (
          <div key={fact.name} className="contents">
            <dt className="max-w-36 text-ink-soft">{fact.name}</dt>
            <dd className="text-right font-medium">{fact.value}</dd>
          </div>
        ))}
      </dl>
    </>
  );
}

function describeBands(bandIds: readonly string[], scene: Scene | null): string {
  const bands = scene?.bands.filter((band) => bandIds.includes(band.id)) ?? [];
  if (bands.length !== bandIds.length) return formatNumber(bandIds.length);
  return bands.map((band) => (band.role === 'other' ? band.name : BAND_ROLE_NAME[band.role])).join(', ');
}
