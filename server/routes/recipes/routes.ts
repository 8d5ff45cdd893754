import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import {
  createNamedRecipeSchema,
  namedRecipeListSchema,
  namedRecipeSchema,
  recipeDiffQuerySchema,
  recipeDiffSchema,
  updateNamedRecipeSchema,
} from '../../../shared/contracts/named-recipe.ts';
import type { App } from '../../app-context.ts';
import type { NamedRecipe } from '../../entities/named-recipe.ts';
import { presentNamedRecipe } from '../../presenters/present-recipe.ts';
import {
  compareRecipes,
  createNamedRecipe,
  deleteNamedRecipe,
  findNamedRecipe,
  listNamedRecipes,
  updateNamedRecipe,
} from '../../services/named-recipes.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

const recipeParams = z.object({ recipeId: idSchema });

async function findRecipeTarget(
  app: App,
  params: { recipeId: string },
): Promise<{ projectId: string; recipe: NamedRecipe } | null> {
  const recipe = await findNamedRecipe(app, params.recipeId);
  return recipe ? { projectId: recipe.projectId, recipe } : null;
}

export const recipeRoutes = [
  route({
    id: 'recipes.list',
    method: 'get',
    path: '/projects/:projectId/recipes',
    summary: 'Recipes kept under a name',
    access: { kind: 'project', action: 'run.read', find: findProjectTarget },
    params: projectParams,
    answer: namedRecipeListSchema,
    handle: async ({ app, viewer, params }) => ({
      recipes: (await listNamedRecipes(app, params.projectId)).map((row) => presentNamedRecipe(row, viewer)),
    }),
  }),
  route({
    id: 'recipes.create',
    method: 'post',
    path: '/projects/:projectId/recipes',
    summary: 'Keep a recipe under a name',
    access: { kind: 'project', action: 'run.start', find: findProjectTarget },
    params: projectParams,
    body: createNamedRecipeSchema,
    answer: namedRecipeSchema,
    status: 201,
    handle: async ({ app, viewer, params, body }) =>
      presentNamedRecipe(await createNamedRecipe(app, params.projectId, viewer.userId, body), viewer),
  }),
  route({
    id: 'recipes.update',
    method: 'patch',
    path: '/recipes/:recipeId',
    summary: 'Rename or replace a named recipe',
    access: { kind: 'project', action: 'run.start', find: findRecipeTarget },
    params: recipeParams,
    body: updateNamedRecipeSchema,
    answer: namedRecipeSchema,
    handle: async ({ app, viewer, target, body }) =>
      presentNamedRecipe(await updateNamedRecipe(app, target.recipe, viewer.userId, body), viewer),
  }),
  route({
    id: 'recipes.delete',
    method: 'delete',
    path: '/recipes/:recipeId',
    summary: 'Delete a named recipe; runs made from it stay',
    access: { kind: 'project', action: 'run.start', find: findRecipeTarget },
    params: recipeParams,
    answer: 'none',
    async handle({ app, viewer, target }) {
      await deleteNamedRecipe(app, target.recipe, viewer.userId);
      return undefined;
    },
  }),
  route({
    id: 'recipes.diff',
    method: 'get',
    path: '/projects/:projectId/recipe-diff',
    summary: 'What sets two recipes apart, of runs or named ones, setting by setting',
    access: { kind: 'project', action: 'run.read', find: findProjectTarget },
    params: projectParams,
    query: recipeDiffQuerySchema,
    answer: recipeDiffSchema,
    handle: ({ app, params, query }) => compareRecipes(app, params.projectId, query),
  }),
];
