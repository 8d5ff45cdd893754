import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { openEventStream } from '../../../client/src/lib/event-stream.ts';

class FakeEventSource {
  static readonly CLOSED = 2;
  static all: FakeEventSource[] = [];
  readyState = 1;
  onopen: (() => void) | null = null;
  onmessage: ((event: { data: string }) => void) | null = null;
  onerror: (() => void) | null = null;
  named = new Map<string, (event: { data: string }) => void>();
  constructor(readonly url: string) {
    FakeEventSource.all.push(this);
  }
  addEventListener(name: string, listener: (event: { data: string }) => void) {
    this.named.set(name, listener);
  }
  close() {
    this.readyState = FakeEventSource.CLOSED;
  }
  breakFor(state: number) {
    this.readyState = state;
    this.onerror?.();
  }
}

beforeEach(() => {
  FakeEventSource.all = [];
  vi.stubGlobal('EventSource', FakeEventSource);
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

const schema = z.object({ done: z.number() });

describe('an event stream', () => {
  it('gives parsed messages on, named ones too, and reports the rest', () => {
    const onMessage = vi.fn();
    const onFault = vi.fn();
    openEventStream('/jobs/events', { schema, onMessage, onFault, eventNames: ['progress'] });
    const source = FakeEventSource.all[0];
    expect(source.url).toBe('/api/v1/jobs/events');
    source.onmessage?.({ data: '{"done":3}' });
    source.named.get('progress')?.({ data: '{"done":4}' });
    source.onmessage?.({ data: '{"done":"many"}' });
    source.onmessage?.({ data: 'not json' });
    expect(onMessage.mock.calls).toEqual([[{ done: 3 }], [{ done: 4 }]]);
    expect(onFault).toHaveBeenCalledTimes(2);
  });

  it('leaves a dropped connection to the browser, and mends a refused one with growing waits', () => {
    const onConnection = vi.fn();
    openEventStream('/jobs/events', { schema, onMessage: vi.fn(), onConnection });
    FakeEventSource.all[0].breakFor(0);
    vi.advanceTimersByTime(60_000);
    expect(FakeEventSource.all).toHaveLength(1);
    FakeEventSource.all[0].breakFor(2);
    vi.advanceTimersByTime(1000);
    expect(FakeEventSource.all).toHaveLength(2);
    FakeEventSource.all[1].breakFor(2);
    vi.advanceTimersByTime(1999);
    expect(FakeEventSource.all).toHaveLength(2);
    vi.advanceTimersByTime(1);
    expect(FakeEventSource.all).toHaveLength(3);
    FakeEventSource.all[2].onopen?.();
    expect(onConnection.mock.lastCall).toEqual([true]);
  });

  it('stays closed once closed', () => {
    const close = openEventStream('/jobs/events', { schema, onMessage: vi.fn() });
    FakeEventSource.all[0].breakFor(2);
    close();
    vi.advanceTimersByTime(60_000);
    expect(FakeEventSource.all).toHaveLength(1);
  });
});
