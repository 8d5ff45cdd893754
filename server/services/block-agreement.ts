import { IsNull, type EntityManager } from 'typeorm';
import type { BlockAgreement } from '../../shared/contracts/block.ts';
import { compareLabellers, type LabelledPixels } from '../analysis/sampling/labeller-agreement.ts';
import type { App } from '../app-context.ts';
import { BlockAssignment } from '../entities/block-assignment.ts';
import type { Block } from '../entities/block.ts';
import { LandClass } from '../entities/land-class.ts';
import { Project } from '../entities/project.ts';
import { Sample } from '../entities/sample.ts';
import { findDrawnPixels } from './drawing-check.ts';
import { findScene } from './scenes.ts';

/**
 * How far the two labellers of a block agree, over the pixels that samples of both cover, on the scene where both drew most;
 * null without two labellers.
 */
export async function measureAgreement(app: App, manager: EntityManager, block: Block): Promise<BlockAgreement | null> {
  const parts = await manager.find(BlockAssignment, {
    where: { blockId: block.id },
    relations: { user: true },
    order: { createdAt: 'ASC', userId: 'ASC' },
  });
  const [first, second] = parts;
  if (!first || !second || parts.length !== 2) return null;
  const project = await manager.findOneByOrFail(Project, { id: block.projectId });
  const classes = await manager.find(LandClass, {
    where: { projectId: block.projectId },
    order: { position: 'ASC' },
  });
  const samples = await manager.find(Sample, {
    where: { blockId: block.id, deletedAt: IsNull() },
    order: { number: 'ASC' },
  });
  const scene = await findScene(app, mostDrawn(samples));
  const pixelsOf = (userId: string): LabelledPixels[] =>
    samples
      .filter((sample) => sample.createdById === userId && sample.sceneId === scene?.id)
      .map(({ id, classId, geometry }) => ({
        id,
        classIndex: classes.findIndex((one) => one.id === classId),
        pixels: (scene && findDrawnPixels(scene, project.studyArea, geometry).pixels) ?? new Uint32Array(),
      }));
  const compared = compareLabellers(pixelsOf(first.userId), pixelsOf(second.userId), classes.length);
  return {
    people: [first, second].map(({ user }) => ({ id: user.id, name: user.name })),
    classIds: classes.map(({ id }) => id),
    ...compared,
    disagreements: compared.disagreements.map(({ firstId, secondId, pixels }) => ({
      firstSampleId: firstId,
      secondSampleId: secondId,
      pixels,
    })),
  };
}

/** The scene with the most samples; an empty name where there is none. */
function mostDrawn(samples: readonly Sample[]): string {
  const counts = new Map<string, number>();
  for (const { sceneId } of samples) counts.set(sceneId, (counts.get(sceneId) ?? 0) + 1);
  return [...counts].sort((a, b) => b[1] - a[1])[0]?.[0] ?? '';
}
