import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { sendScene } from '../../../../client/src/features/scenes/send-scene.ts';
import { UploadDesk } from '../../../../client/src/features/scenes/upload-desk.ts';
import { ProblemError } from '../../../../client/src/lib/problem-error.ts';

vi.mock('../../../../client/src/features/scenes/send-scene.ts', () => ({ sendScene: vi.fn() }));

type Send = typeof sendScene;
let finish: (scene: Scene) => void;
let refuse: (error: Error) => void;
let options: Parameters<Send>[2];

beforeEach(() => {
  vi.mocked(sendScene).mockImplementation((_projectId, _scene, given) => {
    options = given;
    return new Promise<Scene>((resolve, reject) => {
      [finish, refuse] = [resolve, reject];
    });
  });
});

const scene = { name: 'Spring', acquiredOn: null, files: [new File(['abcd'], 'a.tif')] };
const leaves = () => {
  const event = new Event('beforeunload', { cancelable: true });
  window.dispatchEvent(event);
  return !event.defaultPrevented;
};
const settle = () => new Promise((resolve) => setTimeout(resolve, 0));

describe('uploads on their way', () => {
  it('tell their bytes, keep the tab open, and are gone once stored', async () => {
    const desk = new UploadDesk();
    const onStored = vi.fn();
    desk.start('p', scene, onStored);
    options.onProgress(3, 6);
    expect(desk.read()[0]).toMatchObject({ state: 'sending', sentBytes: 3, totalBytes: 6 });
    options.onProgress(6, 6);
    expect(desk.read()[0]?.state).toBe('received');
    expect(leaves()).toBe(false);
    finish({ id: 's' } as Scene);
    await settle();
    expect(desk.read()).toEqual([]);
    expect(onStored).toHaveBeenCalledWith({ id: 's' });
    expect(leaves()).toBe(true);
  });

  it('that are refused say why and can be sent again', async () => {
    const desk = new UploadDesk();
    desk.start('p', scene, vi.fn());
    refuse(new ProblemError({ status: 413, code: 'too-large', title: 'Too large' }));
    await settle();
    expect(desk.read()[0]).toMatchObject({ state: 'refused', problem: { title: 'Too large' } });
    expect(leaves()).toBe(true);
    desk.retry(desk.read()[0]!.id, vi.fn());
    expect(desk.read()[0]).toMatchObject({ state: 'sending', sentBytes: 0, problem: null });
    finish({ id: 's' } as Scene);
    await settle();
    expect(desk.read()).toEqual([]);
  });

  it('that are cancelled stop sending and leave nothing behind', async () => {
    const desk = new UploadDesk();
    const onStored = vi.fn();
    desk.start('p', scene, onStored);
    desk.drop(desk.read()[0]!.id);
    expect(options.signal.aborted).toBe(true);
    refuse(new DOMException('The upload was stopped', 'AbortError'));
    await settle();
    expect(desk.read()).toEqual([]);
    expect(onStored).not.toHaveBeenCalled();
  });
});
