import { MoreHorizontal, Pencil, Trash2 } from 'lucide-react';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { NamedRecipe } from '../../../../shared/contracts/named-recipe.ts';
import { buttonClass } from '../../components/ui/button.tsx';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Menu, MenuItem, MenuLine } from '../../components/ui/menu.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatDateTime } from '../../lib/format-date.ts';
import { paths } from '../../lib/paths.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { RecipeNameDialog } from './recipe-name-dialog.tsx';
import { useDeleteRecipe } from './recipe-queries.ts';

interface RecipeListProps {
  projectId: string;
  recipes: readonly NamedRecipe[];
  /** A recipe in a line. */
  describe: (recipe: NamedRecipe['recipe']) => string;
}

/** Recipes kept under a name: start from one, rename, delete. */
export function RecipeList({ projectId, recipes, describe }: RecipeListProps) {
  const [renamed, setRenamed] = useState<NamedRecipe | null>(null);
  const [deleted, setDeleted] = useState<NamedRecipe | null>(null);
  const remove = useDeleteRecipe(projectId);
  return (
    <>
      <ul className="divide-y divide-line rounded-xl border border-line bg-card">
        {recipes.map((one) => (
          <li key={one.id} className="flex flex-wrap items-center gap-x-5 gap-y-2 px-4 py-3">
            <span className="min-w-56 grow">
              <span className="font-medium">{one.name}</span>
              <span className="block text-sm text-ink-soft">{describe(one.recipe)}</span>
              {one.note && <span className="block text-sm whitespace-pre-line">{one.note}</span>}
            </span>
            <span className="text-sm text-ink-soft">
              {one.createdBy?.name ?? 'someone who left'}, {formatDateTime(one.updatedAt)}
            </span>
            {one.abilities.change && (
              <span className="flex items-center gap-2">
                <Link to={paths.newRunByRecipe(projectId, one.id)} className={buttonClass('secondary', 'sm')}>
                  Start a run from it
                </Link>
                <Menu trigger={<IconButton label={`More about ${one.name}`} icon={<MoreHorizontal />} />}>
                  <MenuItem icon={<Pencil />} onSelect={() => setRenamed(one)}>
                    Rename…
                  </MenuItem>
                  <MenuItem to={paths.newTuning(projectId, { recipeId: one.id })}>Tune its classifier</MenuItem>
                  <MenuLine />
                  <MenuItem icon={<Trash2 />} isDanger onSelect={() => setDeleted(one)}>
                    Delete recipe…
                  </MenuItem>
                </Menu>
              </span>
            )}
          </li>
        ))}
      </ul>
      {renamed && <RecipeNameDialog projectId={projectId} of={renamed} onClose={() => setRenamed(null)} />}
      <ConfirmDialog
        isOpen={deleted !== null}
        onOpenChange={(isOpen) => !isOpen && setDeleted(null)}
        title={`Delete the recipe ${deleted?.name ?? ''}?`}
        loses={['The recipe and its note']}
        keeps="Runs that were started from it stay, with their own recipe."
        confirmLabel="Delete recipe"
        isPending={remove.isPending}
        error={remove.error ? asProblem(remove.error) : null}
        onConfirm={() =>
          deleted &&
          remove.mutate(deleted.id, {
            onSuccess: () => {
              sayDone('Recipe deleted');
              setDeleted(null);
            },
          })
        }
      />
    </>
  );
}
