import type { Scene } from '../../../../shared/contracts/scene.ts';
import { type ProblemError, asProblem } from '../../lib/problem-error.ts';
import { type PacePoint, addPacePoint } from './upload-pace.ts';
import { type SceneUpload, sendScene } from './send-scene.ts';

/** An upload on its way, or one that was refused and waits for a decision. */
export interface DeskUpload {
  id: string;
  projectId: string;
  scene: SceneUpload;
  state: 'sending' | 'received' | 'refused';
  sentBytes: number;
  totalBytes: number;
  pace: readonly PacePoint[];
  problem: ProblemError | null;
}

type Listener = () => void;

/**
 * Keeps uploads going while people move between pages; one per tab. The browser asks before the tab is closed in
 * the middle of one.
 */
export class UploadDesk {
  private uploads: readonly DeskUpload[] = [];
  private readonly listeners = new Set<Listener>();
  private readonly aborts = new Map<string, AbortController>();

  readonly read = (): readonly DeskUpload[] => this.uploads;

  readonly subscribe = (listener: Listener): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  /** Begins to send a scene. @param onStored called once the server has it all */
  start(projectId: string, scene: SceneUpload, onStored: (scene: Scene) => void): void {
    const totalBytes = scene.files.reduce((sum, { size }) => sum + size, 0);
    const id = crypto.randomUUID();
    this.set([
      { id, projectId, scene, state: 'sending', sentBytes: 0, totalBytes, pace: [], problem: null },
      ...this.uploads,
    ]);
    void this.send(id, onStored);
  }

  /** Sends a refused upload once more. */
  retry(id: string, onStored: (scene: Scene) => void): void {
    this.patch(id, { state: 'sending', sentBytes: 0, pace: [], problem: null });
    void this.send(id, onStored);
  }

  /** Stops an upload on its way, or puts a refused one away. */
  drop(id: string): void {
    this.aborts.get(id)?.abort();
    this.set(this.uploads.filter((one) => one.id !== id));
  }

  private async send(id: string, onStored: (scene: Scene) => void): Promise<void> {
    const upload = this.uploads.find((one) => one.id === id);
    if (!upload) return;
    const abort = new AbortController();
    this.aborts.set(id, abort);
    try {
      const stored = await sendScene(upload.projectId, upload.scene, {
        signal: abort.signal,
        onProgress: (sentBytes, totalBytes) => this.noteProgress(id, sentBytes, totalBytes),
      });
      this.set(this.uploads.filter((one) => one.id !== id));
      onStored(stored);
    } catch (error) {
      if (!abort.signal.aborted) this.patch(id, { state: 'refused', problem: asProblem(error) });
    } finally {
      this.aborts.delete(id);
    }
  }

  private noteProgress(id: string, sentBytes: number, totalBytes: number): void {
    const upload = this.uploads.find((one) => one.id === id);
    if (!upload) return;
    const pace = addPacePoint(upload.pace, { atMs: performance.now(), sentBytes });
    this.patch(id, { sentBytes, totalBytes, pace, state: sentBytes >= totalBytes ? 'received' : 'sending' });
  }

  private patch(id: string, change: Partial<DeskUpload>): void {
    this.set(this.uploads.map((one) => (one.id === id ? { ...one, ...change } : one)));
  }

  private set(uploads: readonly DeskUpload[]): void {
    this.uploads = uploads;
    const isBusy = uploads.some(({ state }) => state !== 'refused');
    if (isBusy) window.addEventListener('beforeunload', askBeforeLeaving);
    else window.removeEventListener('beforeunload', askBeforeLeaving);
    for (const listener of this.listeners) listener();
  }
}

function askBeforeLeaving(event: BeforeUnloadEvent): void {
  event.preventDefault();
}
