import { X } from 'lucide-react';
import { useMemo } from 'react';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { type Sample, confidenceSchema } from '../../../../shared/contracts/sample.ts';
import { Button } from '../../components/ui/button.tsx';
import { DataTable } from '../../components/ui/data-table.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Select } from '../../components/ui/select.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { formatCount, formatNumber } from '../../lib/format.ts';
import { CONFIDENCE_TEXT } from './confidence-text.ts';
import { sampleColumns } from './sample-columns.tsx';
import { NO_FILTER, type SampleFilter, isFiltering, sampleAuthors } from './sample-filter.ts';

export interface SampleListProps {
  /** All samples of the scene. */
  samples: readonly Sample[];
  /** Those the filter lets through. */
  shown: readonly Sample[];
  classes: readonly LandClass[];
  filter: SampleFilter;
  onFilter: (filter: SampleFilter) => void;
  selectedId: string | null;
  onSelect: (sample: Sample) => void;
  onClose: () => void;
}

const ALL = 'all';

/** The samples beside the map: sorted by any column, filtered, a press goes there. */
export function SampleList(props: SampleListProps) {
  const { samples, shown, classes, filter, onFilter, selectedId, onSelect, onClose } = props;
  const columns = useMemo(() => sampleColumns(new Map(classes.map((one) => [one.id, one]))), [classes]);
  const choose = (name: 'classId' | 'authorId' | 'confidence') => (value: string) =>
    onFilter({ ...filter, [name]: value === ALL ? null : value });
  const isOn = isFiltering(filter);
  return (
    <section
      aria-label="Sample list"
      className="flex w-[430px] shrink-0 flex-col border-r border-line bg-paper max-xl:w-[360px] max-lg:w-[320px]"
    >
      <header className="flex items-center gap-2 px-3.5 pt-3">
        <h2 className="text-lg font-semibold">Sample list</h2>
        <p role="status" className="text-xs text-ink-soft">
          {isOn
            ? `${formatNumber(shown.length)} of ${formatNumber(samples.length)}`
            : formatCount(samples.length, 'sample')}
        </p>
        <span className="grow" />
        <IconButton label="Close the list" shortcut="M" size="sm" icon={<X />} onClick={onClose} />
      </header>
      <div className="grid grid-cols-2 gap-1.5 px-3.5 pt-2 pb-2.5">
        <TextInput
          type="search"
          aria-label="Find by number, class, person or note"
          placeholder="Number, class, person, note"
          value={filter.text}
          onChange={(event) => onFilter({ ...filter, text: event.target.value })}
          className="min-h-7! px-2! py-0.5! text-sm!"
        />
        <Select
          size="sm"
          aria-label="Class"
          value={filter.classId ?? ALL}
          onChange={choose('classId')}
          options={[{ value: ALL, label: 'Any class' }, ...classes.map(({ id, name }) => ({ value: id, label: name }))]}
        />
        <Select
          size="sm"
          aria-label="Drawn by"
          value={filter.authorId ?? ALL}
          onChange={choose('authorId')}
          options={[
            { value: ALL, label: 'Anyone’s' },
            ...sampleAuthors(samples).map(({ id, name }) => ({ value: id, label: name })),
          ]}
        />
        <Select
          size="sm"
          aria-label="Confidence"
          value={filter.confidence ?? ALL}
          onChange={choose('confidence')}
          options={[
            { value: ALL, label: 'Any confidence' },
            ...confidenceSchema.options.map((value) => ({ value, label: CONFIDENCE_TEXT[value] })),
          ]}
        />
      </div>
      {isOn && (
        <p className="flex items-center justify-between gap-2 px-3.5 pb-1.5 text-xs text-ink-soft">
          The map shows these only.
          <Button size="sm" kind="ghost" onClick={() => onFilter(NO_FILTER)}>
            Show all
          </Button>
        </p>
      )}
      <DataTable
        label="Samples"
        rows={shown}
        columns={columns}
        rowId={rowId}
        onRowClick={onSelect}
        selectedId={selectedId}
        initialSorting={FIRST_SORTING}
        rowHeight={32}
        maxHeight="100%"
        className="min-h-0 grow"
        empty={
          <p className="px-3.5 py-6 text-center text-ink-soft">
            {isOn ? 'No sample passes the filter.' : 'No sample on this scene yet. P draws the first.'}
          </p>
        }
      />
    </section>
  );
}

const rowId = (sample: Sample) => sample.id;
const FIRST_SORTING = [{ id: 'number', desc: true }];
