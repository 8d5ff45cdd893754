import type { SignatureSet } from '../../../../shared/contracts/signature.ts';
import { Callout } from '../../components/ui/callout.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';

/** The pairs of classes that may be taken for each other, worst first, with what would help. */
export function RiskList({ set, onChoose }: { set: SignatureSet; onChoose: (first: number, second: number) => void }) {
  const { risks, pairs, classes } = set;
  const known = pairs.filter(({ errorBound }) => errorBound !== null).length;
  if (risks.length === 0) {
    return (
      <Callout tone={known > 0 ? 'ok' : 'note'}>
        {known === 0
          ? 'No pair can be compared yet: each class needs more pixels than there are bands.'
          : 'No pair at risk: in these bands fewer than 2 % of any two classes’ pixels could be taken for each other.'}
      </Callout>
    );
  }
  return (
    <ol className="divide-y divide-line border-y border-line">
      {risks.map((risk) => {
        const pair = pairs[risk.pair];
        const [one, two] = pair ? [classes[pair.first], classes[pair.second]] : [];
        if (!pair || !one || !two) return null;
        return (
          <li key={risk.pair}>
            <button
              type="button"
              className="focus-inset flex w-full items-start gap-3 px-1 py-2 text-left hover:bg-sunken"
              onClick={() => onChoose(pair.first, pair.second)}
              aria-label={`${risk.text} Show only these two.`}
            >
              <span className="mt-0.5 flex shrink-0 gap-1">
                <ClassSwatch size="sm" colour={one.colour} position={one.position} />
                <ClassSwatch size="sm" colour={two.colour} position={two.position} />
              </span>
              <span>
                <span className="font-medium">{risk.text}</span>
                <span className="block text-sm text-ink-soft">{risk.advice}</span>
              </span>
            </button>
          </li>
        );
      })}
    </ol>
  );
}
