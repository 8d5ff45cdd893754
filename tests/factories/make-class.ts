import type { App } from '../../server/app-context.ts';
import { LandClass } from '../../server/entities/land-class.ts';
import type { Project } from '../../server/entities/project.ts';
import { classPaletteStep } from '../../shared/constants/class-palette.ts';

export async function makeClass(app: App, project: Project, overrides: Partial<LandClass> = {}): Promise<LandClass> {
  const classes = app.db.getRepository(LandClass);
  const position = await classes.countBy({ projectId: project.id });
  const { id } = await classes.save(
    classes.create({
      projectId: project.id,
      code: position + 1,
      name: `Class ${position + 1}`,
      colour: classPaletteStep(position).colour,
      definition: '',
      position,
      ...overrides,
    }),
  );
  return classes.findOneByOrFail({ id });
}
