import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { outlinePaths } from './outline-path.ts';

const BOX = { width: 260, height: 200, margin: 12 };

export interface OutlinePairProps {
  theirs: Polygon;
  mine: Polygon;
  theirColour: string | undefined;
  myColour: string | undefined;
}

/** Two outlines over each other: theirs solid, mine dashed; north is up. */
export function OutlinePair({ theirs, mine, theirColour = '#85867a', myColour = '#85867a' }: OutlinePairProps) {
  const [theirPath, myPath] = outlinePaths([theirs, mine], BOX) ?? [];
  return (
    <figure>
      <svg
        role="img"
        aria-label="Both outlines over each other: as it stands, solid; yours, dashed"
        viewBox={`0 0 ${BOX.width} ${BOX.height}`}
        className="w-full rounded-lg border border-line bg-sunken"
      >
        <path d={theirPath} fill={theirColour} fillOpacity=".35" stroke="var(--ink)" strokeWidth="2" />
        <path
          d={myPath}
          fill={myColour}
          fillOpacity=".25"
          stroke="var(--rust)"
          strokeWidth="2.5"
          strokeDasharray="7 4"
        />
      </svg>
      <figcaption className="mt-1.5 flex gap-4 text-xs text-ink-soft">
        <LineKey stroke="var(--ink)" label="As it stands" />
        <LineKey stroke="var(--rust)" dash="7 4" label="Yours" />
      </figcaption>
    </figure>
  );
}

function LineKey({ stroke, dash, label }: { stroke: string; dash?: string; label: string }) {
  return (
    <span className="flex items-center gap-1.5">
      <svg aria-hidden width="26" height="6">
        <path d="M0 3h26" stroke={stroke} strokeWidth="2.5" strokeDasharray={dash} />
      </svg>
      {label}
    </span>
  );
}
