import { describe, expect, it } from 'vitest';
import { createRng } from '../../server/analysis/sampling/rng.ts';
import { TimeLeft } from '../../server/jobs/time-left.ts';

interface Phase {
  name: string;
  units: number;
  seconds: number;
  /** Share of the whole that the plan gives it. */
  share: number;
}

/** Plays a job whose units take about the same time each, give or take a half; what is said every unit, and what was true. */
function play(phases: readonly Phase[]): { at: number; said: number | null; left: number }[] {
  const rng = createRng(4);
  const meter = new TimeLeft();
  const total = phases.reduce((sum, { seconds }) => sum + seconds, 0);
  const said: { at: number; said: number | null; left: number }[] = [];
  let now = 0;
  let share = 0;
  for (const phase of phases) {
    const weights = Array.from({ length: phase.units }, () => 0.5 + rng.nextFloat());
    const sum = weights.reduce((a, b) => a + b, 0);
    const note = (done: number) => {
      const left = meter.note(phase.name, done, phase.units, share + (phase.share * done) / phase.units, now * 1000);
      said.push({ at: now / total, said: left, left: total - now });
    };
    note(0);
    for (const [i, weight] of weights.entries()) {
      now += (phase.seconds * weight) / sum;
      note(i + 1);
    }
    share += phase.share;
  }
  return said;
}

/** The greatest error from a point on, as a share of what was left; three seconds are forgiven, in which a step shows its pace. */
function worstFrom(said: ReturnType<typeof play>, from: number): number {
  const rows = said.filter(({ at }) => at >= from && at < 1);
  expect(rows.length).toBeGreaterThan(10);
  return Math.max(...rows.map(({ said: guess, left }) => Math.max(0, Math.abs((guess ?? Infinity) - left) - 3) / left));
}

describe('the time left', () => {
  it('settles within 20 % when the plan is right', () => {
    const said = play([
      { name: 'Reading', units: 100, seconds: 3, share: 0.03 },
      { name: 'Training', units: 200, seconds: 40, share: 0.4 },
      { name: 'Mapping', units: 60, seconds: 52, share: 0.52 },
      { name: 'Finishing', units: 50, seconds: 5, share: 0.05 },
    ]);
    expect(worstFrom(said, 0.1)).toBeLessThan(0.2);
  });

  it('settles within 20 % soon after the longest step has begun, though the plan was three times wrong', () => {
    const said = play([
      { name: 'Reading', units: 100, seconds: 1, share: 0.03 },
      { name: 'Training', units: 200, seconds: 20, share: 0.6 },
      { name: 'Mapping', units: 60, seconds: 100, share: 0.32 },
      { name: 'Finishing', units: 50, seconds: 8, share: 0.05 },
    ]);
    // Mapping begins at 16 % of the time.
    expect(worstFrom(said, 0.3)).toBeLessThan(0.2);
  });

  it('says nothing before there is a pace, and does not stand still when work goes slower', () => {
    const meter = new TimeLeft();
    expect(meter.note('Mapping', 0, 100, 0, 0)).toBeNull();
    for (let i = 1; i <= 50; i++) meter.note('Mapping', i, 100, i / 100, i * 1000);
    const before = meter.note('Mapping', 50, 100, 0.5, 50_000)!;
    expect(before).toBeGreaterThan(45);
    expect(before).toBeLessThan(55);
    let left = 0;
    for (let i = 1; i <= 20; i++) left = meter.note('Mapping', 50 + i, 100, 0.5 + i / 100, 50_000 + i * 4000)!;
    // 30 units at 4 s each.
    expect(left).toBeGreaterThan(96);
    expect(left).toBeLessThan(144);
  });
});
