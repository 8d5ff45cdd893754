import type { Disagreement } from '../../../../shared/contracts/reference.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';

const CONFIDENCE_NAMES = { low: 'unsure', medium: 'fairly sure', high: 'sure' } as const;

export interface AnswersBesideProps {
  answers: Disagreement['answers'];
  classes: readonly { id: string; name: string; colour: string; position: number }[];
}

/** What each interpreter said of a point, beside each other. */
export function AnswersBeside({ answers, classes }: AnswersBesideProps) {
  const classOf = (id: string | null) => classes.find((one) => one.id === id);
  if (answers.length === 0) return <p className="text-ink-soft">Nobody answered this point.</p>;
  return (
    <ul className="grid gap-2">
      {answers.map((answer, place) => {
        const first = classOf(answer.classId);
        const second = classOf(answer.alternateClassId);
        return (
          <li key={answer.by?.id ?? place} className="rounded-lg border border-line px-3 py-2">
            <p className="text-xs text-ink-soft">{answer.by?.name ?? 'someone no longer here'}</p>
            <p className="mt-0.5 flex items-center gap-2 font-medium">
              {first && <ClassSwatch size="sm" colour={first.colour} position={first.position} />}
              {first?.name ?? 'a class taken away'}
              <span className="font-normal text-ink-soft">{CONFIDENCE_NAMES[answer.confidence]}</span>
            </p>
            {second && <p className="text-xs text-ink-soft">second choice {second.name}</p>}
            {answer.note && <p className="mt-1 whitespace-pre-line">{answer.note}</p>}
          </li>
        );
      })}
    </ul>
  );
}
