import type { ReactNode } from 'react';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Recipe, RecipeCheck } from '../../../../shared/contracts/run.ts';
import { Callout } from '../../components/ui/callout.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatNumber } from '../../lib/format.ts';
import type { useRecipeCheck } from './check-recipe.ts';

interface RecipeCheckPanelProps {
  recipe: Recipe | null;
  check: ReturnType<typeof useRecipeCheck>;
  classes: readonly LandClass[];
}

/** What stops the recipe, what to think of, and how its samples would be split. */
export function RecipeCheckPanel({ recipe, check, classes }: RecipeCheckPanelProps) {
  return (
    <section aria-labelledby="recipe-check" className="rounded-xl border border-line bg-card p-4">
      <h2 id="recipe-check" className="text-lg font-semibold">
        What this comes to
      </h2>
      <div aria-live="polite" className="mt-2 space-y-3">
        {recipe === null ? (
          <Line>Mend the marked fields; then the recipe is checked against the samples.</Line>
        ) : check.isPending ? (
          <PendingState label="Checking the recipe" shape="table" rows={5} />
        ) : check.isError ? (
          <ErrorState error={check.error} onRetry={() => void check.refetch()} isInline />
        ) : (
          <CheckResult check={check.data} classes={classes} isStale={check.isPlaceholderData} />
        )}
      </div>
    </section>
  );
}

function CheckResult({
  check,
  classes,
  isStale,
}: {
  check: RecipeCheck;
  classes: readonly LandClass[];
  isStale: boolean;
}) {
  const stops = check.problems.filter(({ severity }) => severity === 'stops');
  const warns = check.problems.filter(({ severity }) => severity === 'warns');
  return (
    <div className={isStale ? 'space-y-3 opacity-60' : 'space-y-3'}>
      {stops.length === 0 ? (
        <Line>{warns.length === 0 ? 'Nothing stands against this recipe.' : 'It can be started.'}</Line>
      ) : (
        <Problems tone="danger" title="Stops the run" texts={stops.map(({ text }) => text)} />
      )}
      {warns.length > 0 && <Problems tone="beware" title="Think of" texts={warns.map(({ text }) => text)} />}
      {check.perClass.length > 0 && <SplitTable perClass={check.perClass} classes={classes} />}
    </div>
  );
}

function Line({ children }: { children: ReactNode }) {
  return <p className="text-sm text-ink-soft">{children}</p>;
}

function Problems({ tone, title, texts }: { tone: 'danger' | 'beware'; title: string; texts: readonly string[] }) {
  return (
    <Callout tone={tone} title={title}>
      <ul className="mt-1 max-h-64 space-y-1.5 overflow-y-auto">
        {texts.map((text) => (
          <li key={text}>{text}</li>
        ))}
      </ul>
    </Callout>
  );
}

function SplitTable({ perClass, classes }: { perClass: RecipeCheck['perClass']; classes: readonly LandClass[] }) {
  const total = (side: 'trainingPolygons' | 'heldOutPolygons') => perClass.reduce((sum, row) => sum + row[side], 0);
  return (
    <table className="w-full border-separate border-spacing-0 text-sm">
      <caption className="pb-1 text-left text-xs text-ink-soft">Polygons of each class, by whole polygon</caption>
      <thead>
        <tr className="text-ink-soft *:border-b *:border-edge *:py-1 *:font-medium">
          <th scope="col" className="text-left">
            Class
          </th>
          <th scope="col" className="pl-2 text-right">
            learned from
          </th>
          <th scope="col" className="pl-2 text-right">
            held out
          </th>
        </tr>
      </thead>
      <tbody>
        {perClass.map((row) => {
          const landClass = classes.find((one) => one.id === row.classId);
          return (
            <tr key={row.classId} className="*:border-b *:border-line *:py-1">
              <th scope="row" className="text-left font-normal">
                <span className="flex items-center gap-2 leading-tight">
                  {landClass && <ClassSwatch size="sm" colour={landClass.colour} position={landClass.position} />}
                  {row.name}
                </span>
              </th>
              <Count value={row.trainingPolygons} />
              <Count value={row.heldOutPolygons} />
            </tr>
          );
        })}
      </tbody>
      <tfoot>
        <tr className="*:pt-1.5 *:font-medium">
          <th scope="row" className="text-left">
            Together
          </th>
          <td className="text-right">{formatNumber(total('trainingPolygons'))}</td>
          <td className="text-right">{formatNumber(total('heldOutPolygons'))}</td>
        </tr>
      </tfoot>
    </table>
  );
}

function Count({ value }: { value: number }) {
  return <td className={`text-right ${value === 0 ? 'font-medium text-rust' : ''}`}>{formatNumber(value)}</td>;
}
