import type { App } from '../app-context.ts';

export function loadDemoOnce(_app: App): Promise<string[]> {
  return Promise.resolve([]);
}
