import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import type { DataTableColumn } from '../../components/ui/data-table.tsx';
import { formatSince } from '../../lib/format-date.ts';
import { formatNumber } from '../../lib/format.ts';
import { CONFIDENCE_TEXT } from './confidence-text.ts';

const CONFIDENCE_RANK = { low: 0, medium: 1, high: 2 };

/** The columns of the sample list; classes sort by their place in the scheme, confidence by its rank. */
export function sampleColumns(classes: ReadonlyMap<string, LandClass>): DataTableColumn<Sample>[] {
  return [
    { id: 'number', header: 'No.', accessorKey: 'number', meta: { align: 'right', width: '3.2rem' } },
    {
      id: 'class',
      header: 'Class',
      accessorFn: (sample) => classes.get(sample.classId)?.position ?? -1,
      cell: ({ row }) => <ClassCell landClass={classes.get(row.original.classId)} />,
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
