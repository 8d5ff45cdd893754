import { X } from 'lucide-react';
import { useCallback, useMemo, useState } from 'react';
import type { Block } from '../../../../shared/contracts/block.ts';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { type Sample, confidenceSchema, sampleStateSchema } from '../../../../shared/contracts/sample.ts';
import { Button } from '../../components/ui/button.tsx';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { DataTable } from '../../components/ui/data-table.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Select } from '../../components/ui/select.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { formatCount, formatNumber } from '../../lib/format.ts';
import { BulkActs } from './bulk-acts.tsx';
import { CONFIDENCE_TEXT } from './confidence-text.ts';
import { sampleColumns } from './sample-columns.tsx';
import { NO_FILTER, type SampleFilter, isFiltering, sampleAuthors } from './sample-filter.ts';
import { SAMPLE_STATE_TEXT } from './sample-state.tsx';

export interface SampleListProps {
  /** All samples of the scene. */
  samples: readonly Sample[];
  /** Those the filter lets through. */
  shown: readonly Sample[];
  classes: readonly LandClass[];
  filter: SampleFilter;
  onFilter: (filter: SampleFilter) => void;
  projectId: string;
  viewerId: string;
  blocks: readonly Block[];
  selectedId: string | null;
  onSelect: (sample: Sample) => void;
  onClose: () => void;
}

const ALL = 'all';

/** The samples beside the map: sorted by any column, filtered, a press goes there. */
export function SampleList(props: SampleListProps) {
  const { samples, shown, classes, filter, onFilter, selectedId, onSelect, onClose } = props;
  const [ticked, setTicked] = useState<ReadonlySet<string>>(new Set());
  const tick = useCallback((id: string, isOn: boolean) => {
    setTicked((now) => {
      const next = new Set(now);
      if (isOn) next.add(id);
      else next.delete(id);
      return next;
    });
  }, []);
  const chosen = useMemo(() => shown.filter(({ id }) => ticked.has(id)), [shown, ticked]);
  const columns = useMemo(
    () => sampleColumns(new Map(classes.map((one) => [one.id, one])), ticked, tick),
    [classes, ticked, tick],
  );
  const choose = (name: 'classId' | 'authorId' | 'confidence' | 'state' | 'blockId') => (value: string) =>
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
        <Select
          size="sm"
          aria-label="State"
          value={filter.state ?? ALL}
          onChange={choose('state')}
          options={[
            { value: ALL, label: 'Any state' },
            ...sampleStateSchema.options.map((value) => ({ value, label: SAMPLE_STATE_TEXT[value] })),
          ]}
        />
        {props.blocks.length > 0 && (
          <Select
            size="sm"
            aria-label="Block"
            value={filter.blockId ?? ALL}
            onChange={choose('blockId')}
            options={[
              { value: ALL, label: 'Any block' },
              ...props.blocks.map(({ id, name }) => ({ value: id, label: `Block ${name}` })),
            ]}
          />
        )}
        <Checkbox
          label={<span className="text-sm">Open comments only</span>}
          isChecked={filter.hasRemarks}
          onChange={(hasRemarks) => onFilter({ ...filter, hasRemarks })}
          className="items-center!"
        />
        <Checkbox
          label={<span className="text-sm">Tick all shown</span>}
          isChecked={chosen.length === 0 ? false : chosen.length === shown.length ? true : 'mixed'}
          onChange={(isOn) => setTicked(new Set(isOn ? shown.map(({ id }) => id) : []))}
          className="items-center!"
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
      <BulkActs
        projectId={props.projectId}
        viewerId={props.viewerId}
        chosen={chosen}
        shown={shown}
        onDone={() => setTicked(new Set())}
      />
    </section>
  );
}

const rowId = (sample: Sample) => sample.id;
const FIRST_SORTING = [{ id: 'number', desc: true }];
