import { useEffect, useRef } from 'react';
import type { ZodType } from 'zod';
import { API_BASE } from './fetch-json.ts';

export interface EventStreamOptions<T> {
  /** Checked on every message; one that does not match is reported to `onFault` and dropped. */
  schema: ZodType<T>;
  onMessage: (message: T) => void;
  /** Named server-sent events to listen to besides the unnamed ones. */
  eventNames?: string[];
  /** True when the stream is open, false while it is being mended: show it, and refetch on true. */
  onConnection?: (isOpen: boolean) => void;
  onFault?: (error: Error) => void;
}

const FIRST_WAIT_MS = 1000;
const LONGEST_WAIT_MS = 30_000;

/**
 * Listens to a server-sent event stream and mends it with growing waits when it breaks.
 *
 * @param path under /api/v1, with its leading slash
 * @returns a function that closes the stream
 */
export function openEventStream<T>(path: string, options: EventStreamOptions<T>): () => void {
  let source: EventSource | undefined;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let waitMs = FIRST_WAIT_MS;
  let isClosed = false;

  const receive = (event: MessageEvent<string>) => {
    const parsed = parseMessage(event.data, options.schema);
    if (parsed instanceof Error) options.onFault?.(parsed);
    else options.onMessage(parsed.message);
  };

  const connect = () => {
    source = new EventSource(`${API_BASE}${path}`);
    source.onopen = () => {
      waitMs = FIRST_WAIT_MS;
      options.onConnection?.(true);
    };
    source.onmessage = receive;
    for (const name of options.eventNames ?? []) source.addEventListener(name, receive as (event: Event) => void);
    source.onerror = () => {
      options.onConnection?.(false);
      // The browser mends a dropped stream itself, but gives up for good on a refused one (a restart, a proxy's 502).
      if (source?.readyState !== EventSource.CLOSED || isClosed) return;
      timer = setTimeout(connect, waitMs);
      waitMs = Math.min(waitMs * 2, LONGEST_WAIT_MS);
    };
  };

  connect();
  return () => {
    isClosed = true;
    clearTimeout(timer);
    source?.close();
  };
}

function parseMessage<T>(data: string, schema: ZodType<T>): { message: T } | Error {
  let value: unknown;
  try {
    value = JSON.parse(data);
  } catch (error) {
    return error instanceof Error ? error : new Error(String(error));
  }
  const parsed = schema.safeParse(value);
  return parsed.success ? { message: parsed.data } : parsed.error;
}

/** Keeps a stream open while the component is there; `path` null keeps it closed. Callbacks may change freely. */
export function useEventStream<T>(path: string | null, options: EventStreamOptions<T>): void {
  const latest = useRef(options);
  useEffect(() => {
    latest.current = options;
  });
  const names = (options.eventNames ?? []).join(' ');
  useEffect(() => {
    if (path === null) return undefined;
    return openEventStream<T>(path, {
      schema: latest.current.schema,
      eventNames: names ? names.split(' ') : [],
      onMessage: (message) => latest.current.onMessage(message),
      onConnection: (isOpen) => latest.current.onConnection?.(isOpen),
      onFault: (error) => latest.current.onFault?.(error),
    });
  }, [path, names]);
}
