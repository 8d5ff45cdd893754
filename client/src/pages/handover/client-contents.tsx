import { ChartNoAxesColumn, FileText, Map as MapIcon, TableProperties } from 'lucide-react';
import type { ReactNode } from 'react';

const CONTENTS: readonly { icon: ReactNode; name: string; text: string }[] = [
  {
    icon: <MapIcon />,
    name: 'The class map',
    text: 'On screen with the class scheme as its legend, and as a GeoTIFF with class codes, names and colours.',
  },
  {
    icon: <TableProperties />,
    name: 'The area of each class',
    text: 'In hectares, with how the figure was obtained and how far it can be off.',
  },
  {
    icon: <ChartNoAxesColumn />,
    name: 'How accurate it is',
    text: 'The confusion matrix, overall, user’s and producer’s accuracy, each with its sample size and interval.',
  },
  {
    icon: <FileText />,
    name: 'The report',
    text: 'Scenes and dates, class definitions, the recipe of the run, and the cautions beside: enough for a stranger to check.',
  },
];

/** What a handover is made of. */
export function ClientContents() {
  return (
    <ul className="overflow-hidden rounded-lg border border-line bg-card">
      {CONTENTS.map(({ icon, name, text }) => (
        <li key={name} className="flex gap-4 border-b border-line px-5 py-4 last:border-b-0">
          <span aria-hidden className="mt-0.5 text-spruce [&_svg]:size-5">
            {icon}
          </span>
          <div>
            <h3 className="font-medium">{name}</h3>
            <p className="text-sm text-ink-soft">{text}</p>
          </div>
        </li>
      ))}
    </ul>
  );
}
