import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import type { DataTableColumn } from '../../components/ui/data-table.tsx';
import { formatSince } from '../../lib/format-date.ts';
import { formatNumber } from '../../lib/format.ts';
import { CONFIDENCE_TEXT } from './confidence-text.ts';
import { SampleStateTag } from './sample-state.tsx';

const STATE_RANK = { returned: 0, draft: 1, submitted: 2, accepted: 3 };
const CONFIDENCE_RANK = { low: 0, medium: 1, high: 2 };

/** The columns of the sample list; classes sort by their place in the scheme, confidence by its rank. */
export function sampleColumns(
  classes: ReadonlyMap<string, LandClass>,
  ticked: ReadonlySet<string>,
  onTick: (sampleId: string, isOn: boolean) => void,
): DataTableColumn<Sample>[] {
  return [
    {
      id: 'tick',
      header: '',
      enableSorting: false,
      cell: ({ row: { original } }) => (
        <Checkbox
          isLabelHidden
          label={`Tick sample ${original.number}`}
          isChecked={ticked.has(original.id)}
          onChange={(isOn) => onTick(original.id, isOn)}
        />
      ),
      meta: { width: '2rem' },
    },
    { id: 'number', header: 'No.', accessorKey: 'number', meta: { align: 'right', width: '3.2rem' } },
    {
      id: 'class',
      header: 'Class',
      accessorFn: (sample) => classes.get(sample.classId)?.position ?? -1,
      cell: ({ row }) => <ClassCell landClass={classes.get(row.original.classId)} />,
    },
    {
      id: 'state',
      header: 'State',
      accessorFn: (sample) => STATE_RANK[sample.state],
      cell: ({ row: { original } }) => (
        <span className="flex items-center gap-1 whitespace-nowrap">
          <SampleStateTag state={original.state} />
          {original.openRemarks > 0 && (
            <span title="Open comments" className="text-xs text-ink-soft">
              {original.openRemarks} <span aria-hidden>✎</span>
              <span className="sr-only">open comments</span>
            </span>
          )}
        </span>
      ),
    },
    {
      id: 'pixels',
      header: 'Pixels',
      accessorKey: 'pixelCount',
      cell: ({ row }) => formatNumber(row.original.pixelCount),
      meta: { align: 'right' },
    },
    {
      id: 'area',
      header: 'Area, ha',
      accessorKey: 'areaHa',
      cell: ({ row }) => formatNumber(row.original.areaHa, 2),
      meta: { align: 'right' },
    },
    {
      id: 'confidence',
      header: 'Confidence',
      accessorFn: (sample) => CONFIDENCE_RANK[sample.confidence],
      cell: ({ row }) => CONFIDENCE_TEXT[row.original.confidence],
    },
    {
      id: 'author',
      header: 'Drawn by',
      accessorFn: (sample) => sample.createdBy?.name ?? '',
      cell: ({ row }) => <span className="whitespace-nowrap">{row.original.createdBy?.name ?? '–'}</span>,
    },
    {
      id: 'changed',
      header: 'Changed',
      accessorKey: 'updatedAt',
      cell: ({ row }) => <span className="whitespace-nowrap">{formatSince(row.original.updatedAt)}</span>,
    },
  ];
}

function ClassCell({ landClass }: { landClass: LandClass | undefined }) {
  if (!landClass) return <>–</>;
  return (
    <span className="flex items-center gap-1.5 whitespace-nowrap">
      <ClassSwatch colour={landClass.colour} position={landClass.position} size="sm" />
      {landClass.name}
    </span>
  );
}
