import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { defaultDraft } from '../../../../client/src/features/runs/default-recipe.ts';
import { RecipeForm } from '../../../../client/src/features/runs/recipe-form.tsx';
import { useStartRun } from '../../../../client/src/features/runs/start-run.ts';
import type { Recipe } from '../../../../shared/contracts/run.ts';
import { makeClass, makeScene, uuid } from './recipe-ground.ts';

afterEach(() => vi.unstubAllGlobals());

const scenes = [makeScene(1)];
const classes = [makeClass(1, 8), makeClass(2, 5)];

function Form({ onRecipe }: { onRecipe: (recipe: Recipe | null) => void }) {
  const start = useStartRun('p1');
  return (
    <>
      <RecipeForm
        formId="recipe"
        draft={defaultDraft(scenes, classes)!}
        scenes={scenes}
        classes={classes}
        start={start}
        onRecipe={onRecipe}
        onStarted={vi.fn()}
      />
      <button type="submit" form="recipe">
        Start run
      </button>
    </>
  );
}

function show() {
  const onRecipe = vi.fn<(recipe: Recipe | null) => void>();
  render(
    <QueryClientProvider client={new QueryClient()}>
      <Form onRecipe={onRecipe} />
    </QueryClientProvider>,
  );
  return { last: () => onRecipe.mock.lastCall?.[0] };
}

describe('the recipe form', () => {
  it('hands on the recipe as it stands, and none while a field is wrong', async () => {
    const { last } = show();
    const trees = screen.getByRole('textbox', { name: 'Trees' });
    await userEvent.clear(trees);
    expect(await screen.findByText('A number is wanted.')).toBeInTheDocument();
    await waitFor(() => expect(last()).toBeNull());
    await userEvent.type(trees, '40');
    await waitFor(() => expect(last()?.classifier).toMatchObject({ kind: 'random-forest', trees: 40 }));
  });

  it('shows a thermal band’s caution once it is chosen', async () => {
    show();
    expect(screen.queryByText(/coarser footprint/)).toBeNull();
    await userEvent.click(
      within(screen.getByRole('group', { name: 'Bands' })).getByRole('checkbox', { name: /Thermal/ }),
    );
    expect(screen.getByText(/coarser footprint/)).toBeInTheDocument();
  });

  it('warns of slow classifiers, and keeps the settings of the one that was left', async () => {
    const { last } = show();
    const trees = screen.getByRole('textbox', { name: 'Trees' });
    await userEvent.clear(trees);
    await userEvent.type(trees, '300');
    await userEvent.click(screen.getByRole('radio', { name: 'Random-subspace forest' }));
    expect(screen.getByText('Slow.')).toBeInTheDocument();
    await userEvent.click(screen.getByRole('radio', { name: 'k-nearest neighbours' }));
    expect(screen.queryByText('Slow.')).toBeNull();
    expect(screen.queryByRole('textbox', { name: 'Trees' })).toBeNull();
    await waitFor(() =>
      expect(last()?.classifier).toEqual({ kind: 'nearest-neighbours', neighbours: 5, standardise: true }),
    );
    await userEvent.click(screen.getByRole('radio', { name: 'Random forest' }));
    expect(screen.getByRole('textbox', { name: 'Trees' })).toHaveValue('300');
  });

  it('offers what each classifier can be told, and a share below which pixels stay unclassified', async () => {
    const { last } = show();
    await userEvent.click(screen.getByRole('radio', { name: 'All the same' }));
    await waitFor(() => expect(last()?.classifier).toMatchObject({ classWeights: 'balanced' }));
    await userEvent.click(screen.getByRole('radio', { name: 'Gaussian maximum likelihood' }));
    const ridge = screen.getByRole('textbox', { name: /Ridge/ });
    await userEvent.clear(ridge);
    await userEvent.type(ridge, '5');
    await userEvent.click(screen.getByRole('radio', { name: 'As training pixels stand' }));
    await waitFor(() =>
      expect(last()?.classifier).toEqual({ kind: 'gaussian-maximum-likelihood', priors: 'training', ridge: 0.05 }),
    );
    await userEvent.click(screen.getByRole('radio', { name: 'Minimum distance' }));
    await userEvent.click(screen.getByRole('radio', { name: 'Euclidean' }));
    const share = screen.getByRole('textbox', { name: /Leave unclassified below/ });
    await userEvent.clear(share);
    await userEvent.type(share, '60');
    await waitFor(() =>
      expect(last()).toMatchObject({ minShare: 0.6, classifier: { kind: 'minimum-distance', metric: 'euclidean' } }),
    );
  });

  it('takes an empty number of bands for the square root', async () => {
    const { last } = show();
    const features = screen.getByRole('textbox', { name: 'Bands a split' });
    await userEvent.type(features, '2');
    await waitFor(() => expect(last()?.classifier).toMatchObject({ featuresPerTree: 2 }));
    await userEvent.clear(features);
    await waitFor(() => expect(last()?.classifier).toMatchObject({ featuresPerTree: null }));
  });

  it('sends what it shows, and puts a refusal beside its field', async () => {
    const send = vi.fn((_url: string, _init: RequestInit) =>
      Promise.resolve(
        Response.json(
          {
            ...{ type: 'about:blank', title: 'The recipe cannot be run.', status: 400, code: 'recipe-refused' },
            errors: [{ path: 'recipe.classIds', message: 'Class 2 has 0 usable samples.' }],
          },
          { status: 400 },
        ),
      ),
    );
    vi.stubGlobal('fetch', send);
    show();
    await userEvent.type(screen.getByRole('textbox', { name: /^Name/ }), 'First look');
    await userEvent.click(screen.getByRole('button', { name: 'Start run' }));
    const group = screen.getByRole('group', { name: 'Classes' });
    expect(await within(group).findByRole('alert')).toHaveTextContent('Class 2 has 0 usable samples.');
    const body = JSON.parse(String(send.mock.calls[0]?.[1].body)) as { name: string; recipe: Recipe };
    expect(body.name).toBe('First look');
    expect(body.recipe).toMatchObject({ sceneId: uuid(1), bandIds: [uuid(101), uuid(102)], heldOutShare: 0.3 });
  });
});
