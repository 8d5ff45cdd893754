/**
 * Does work for each item, at most `limit` at a time. The first failure or the signal stops the rest; all work has ended when
 * this settles, so nothing is written afterwards.
 * @throws the first failure, or the signal's reason.
 */
export async function forEachLimited<T>(
  items: readonly T[],
  limit: number,
  signal: AbortSignal,
  work: (item: T, signal: AbortSignal) => Promise<void>,
): Promise<void> {
  const stop = new AbortController();
  const either = AbortSignal.any([signal, stop.signal]);
  const queue = items.values();
  let failure: { error: unknown } | null = null;
  const takeTurns = async (): Promise<void> => {
    for (const item of queue) {
      if (either.aborted) return;
      try {
        await work(item, either);
      } catch (error) {
        failure ??= { error };
        stop.abort(error);
      }
    }
  };
  await Promise.all(Array.from({ length: Math.max(1, limit) }, takeTurns));
  signal.throwIfAborted();
  if (failure) throw (failure as { error: unknown }).error;
}
