import { describe, expect, it } from 'vitest';
import { WaitingLine } from '../../server/jobs/waiting-line.ts';

/** Work that ends when told to, and notes when it began. */
function gate(name: string, begun: string[]) {
  let open: () => void = () => undefined;
  const ended = new Promise<void>((resolve) => (open = resolve));
  const work = async () => {
    begun.push(name);
    await ended;
    return name;
  };
  return { work, open };
}

describe('a waiting line', () => {
  it('lets in as many as it has places, then the latest that came', async () => {
    const begun: string[] = [];
    const line = new WaitingLine(2);
    const gates = ['a', 'b', 'c', 'd'].map((name) => gate(name, begun));
    const answers = gates.map(({ work }) => line.run(work));
    await Promise.resolve();
    expect(begun).toEqual(['a', 'b']);
    gates[0].open();
    await answers[0];
    await expect.poll(() => begun).toEqual(['a', 'b', 'd']);
    gates.forEach(({ open }) => open());
    expect(await Promise.all(answers)).toEqual(['a', 'b', 'c', 'd']);
  });

  it('never begins what was given up while it waited, and keeps its place free for others', async () => {
    const begun: string[] = [];
    const line = new WaitingLine(1);
    const [first, second, third] = ['first', 'second', 'third'].map((name) => gate(name, begun));
    const leave = new AbortController();
    const answers = [line.run(first.work), line.run(second.work, leave.signal), line.run(third.work)];
    leave.abort(new Error('the browser has gone'));
    await expect(answers[1]).rejects.toThrow('the browser has gone');
    first.open();
    third.open();
    expect(await answers[2]).toBe('third');
    expect(begun).toEqual(['first', 'third']);
    await expect(line.run(second.work, leave.signal)).rejects.toThrow('the browser has gone');
  });

  it('gives the place on when work fails', async () => {
    const line = new WaitingLine(1);
    await expect(line.run(() => Promise.reject(new Error('broken tile')))).rejects.toThrow('broken tile');
    expect(await line.run(() => Promise.resolve(7))).toBe(7);
  });
});
