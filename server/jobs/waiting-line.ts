interface Waiter {
  start: () => void;
  signal: AbortSignal | undefined;
  onAbort: () => void;
}

/**
 * Lets so many pieces of work in at a time, the latest first: on a map that moves, the tiles asked for last are the ones
 * in view. Work whose signal aborts while it waits never starts; once started it runs to its end, because ending a
 * worker thread would throw away the blocks it has decoded.
 */
export class WaitingLine {
  private readonly waiting: Waiter[] = [];
  private free: number;

  constructor(places: number) {
    this.free = places;
  }

  /** @throws the signal's reason when it aborts before the work has started */
  async run<T>(work: () => Promise<T>, signal?: AbortSignal): Promise<T> {
    signal?.throwIfAborted();
    if (this.free > 0) this.free--;
    else await this.wait(signal);
    try {
      return await work();
    } finally {
      const next = this.waiting.pop();
      if (next) {
        next.signal?.removeEventListener('abort', next.onAbort);
        next.start();
      } else {
        this.free++;
      }
    }
  }

  private wait(signal: AbortSignal | undefined): Promise<void> {
    return new Promise((start, refuse) => {
      const waiter: Waiter = {
        start,
        signal,
        onAbort: () => {
          this.waiting.splice(this.waiting.indexOf(waiter), 1);
          refuse(signal?.reason);
        },
      };
      signal?.addEventListener('abort', waiter.onAbort, { once: true });
      this.waiting.push(waiter);
    });
  }
}
