import type { Block } from '../../../../shared/contracts/block.ts';
import { formatNumber } from '../../lib/format.ts';

/** How far each person is in all their blocks together. */
export function PersonProgress({ blocks }: { blocks: readonly Block[] }) {
  const people = new Map<string, { name: string; blocks: number; done: number; samples: number; waiting: number }>();
  for (const { assignments } of blocks) {
    for (const { person, doneAt, samples, submitted } of assignments) {
      const sum = people.get(person.id) ?? { name: person.name, blocks: 0, done: 0, samples: 0, waiting: 0 };
      sum.blocks += 1;
      sum.done += doneAt ? 1 : 0;
      sum.samples += samples;
      sum.waiting += submitted;
      people.set(person.id, sum);
    }
  }
  if (people.size === 0) return null;
  return (
    <table aria-label="Progress by person" className="w-full text-sm">
      <thead className="text-left text-ink-soft">
        <tr>
          <th className="py-1 font-medium">Labeller</th>
          <th className="text-right font-medium">Blocks done</th>
          <th className="text-right font-medium">Samples</th>
          <th className="text-right font-medium">To review</th>
        </tr>
      </thead>
      <tbody>
        {[...people].map(([id, sum]) => (
          <tr key={id} className="border-t border-line">
            <td className="py-1">{sum.name}</td>
            <td className="text-right">
              {sum.done} of {sum.blocks}
            </td>
            <td className="text-right">{formatNumber(sum.samples)}</td>
            <td className="text-right">{formatNumber(sum.waiting)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
