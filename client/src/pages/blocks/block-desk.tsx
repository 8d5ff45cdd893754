import { Grid2x2, PenTool, UserPlus } from 'lucide-react';
import { useCallback, useRef, useState } from 'react';
import { Link } from 'react-router-dom';
import type { BlockList } from '../../../../shared/contracts/block.ts';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { MapPage } from '../../components/layout/map-page.tsx';
import { PageHeader } from '../../components/layout/page-header.tsx';
import type { ShapeEditorHandle } from '../../components/map/shape-editor.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { AssignDialog } from '../../features/blocks/assign-dialog.tsx';
import { BlockMap } from '../../features/blocks/block-map.tsx';
import { BlockSlip } from '../../features/blocks/block-slip.tsx';
import { BlockTable } from '../../features/blocks/block-table.tsx';
import { CutDialog } from '../../features/blocks/cut-dialog.tsx';
import { DrawDialog } from '../../features/blocks/draw-dialog.tsx';
import { PersonProgress } from '../../features/blocks/person-progress.tsx';
import { useSamples } from '../../features/samples/samples-query.ts';
import { useKeys } from '../../lib/keys.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** Blocks on the map and in a table; the lead cuts, draws and assigns them. */
export function BlockDesk({ scene, list }: { scene: Scene; list: BlockList }) {
  const project = useProject();
  const samples = useSamples(project.id);
  const editor = useRef<ShapeEditorHandle>(null);
  const { blocks, nClasses, abilities } = list;
  const [selectedId, setSelectedId] = useState<string | null>(null);
  const [ticked, setTicked] = useState<ReadonlySet<string>>(new Set());
  const [isDrawing, setIsDrawing] = useState(false);
  const [drawn, setDrawn] = useState<Polygon | null>(null);
  const [isCutting, setIsCutting] = useState(false);
  const [assigning, setAssigning] = useState<readonly string[] | null>(null);
  const [pairIds, setPairIds] = useState<readonly string[]>([]);
  const selected = blocks.find(({ id }) => id === selectedId) ?? null;
  const select = (id: string | null) => {
    setSelectedId(id);
    setPairIds([]);
  };
  const tick = useCallback((id: string, isOn: boolean) => {
    setTicked((now) => {
      const next = new Set(now);
      if (isOn) next.add(id);
      else next.delete(id);
      return next;
    });
  }, []);
  useKeys({
    Escape: () => {
      if (isDrawing) {
        editor.current?.leave();
        setIsDrawing(false);
      } else select(null);
    },
    Enter: () => (isDrawing && editor.current?.isDrawing() ? editor.current.close() : false),
  });
  const pair = (samples.data ?? [])
    .filter(({ id }) => pairIds.includes(id))
    .map(({ geometry, number, createdBy }) => ({
      geometry,
      label: `${createdBy?.name ?? 'Someone'}, sample ${number}`,
    }));
  return (
    <>
      <MapPage
        header={
          <PageHeader
            title="Blocks"
            action={
              <>
                <Link to={paths.samples(project.id)} className={buttonClass('secondary', 'sm')}>
                  Sampling desk
                </Link>
                {abilities.manage && (
                  <>
                    <Button
                      size="sm"
                      kind={isDrawing ? 'strong' : 'secondary'}
                      aria-pressed={isDrawing}
                      icon={<PenTool aria-hidden />}
                      onClick={() => setIsDrawing(!isDrawing)}
                    >
                      Draw block
                    </Button>
                    <Button
                      kind={blocks.length === 0 ? 'primary' : 'secondary'}
                      size={blocks.length === 0 ? 'md' : 'sm'}
                      icon={<Grid2x2 aria-hidden />}
                      onClick={() => setIsCutting(true)}
                    >
                      Cut into blocks
                    </Button>
                    {blocks.length > 0 && (
                      <Button
                        kind="primary"
                        icon={<UserPlus aria-hidden />}
                        disabled={ticked.size === 0}
                        onClick={() => setAssigning([...ticked])}
                      >
                        Assign {ticked.size > 0 ? ticked.size : ''} ticked
                      </Button>
                    )}
                  </>
                )}
              </>
            }
          />
        }
        list={
          <section
            aria-label="Block list"
            className="flex w-[430px] shrink-0 flex-col border-r border-line bg-paper max-xl:w-[360px] max-lg:w-[320px]"
          >
            {blocks.length === 0 ? (
              <p className="px-4 py-6 text-ink-soft">
                No blocks yet.{' '}
                {abilities.manage
                  ? 'Cut the study area into squares, or draw blocks by hand; then give each to one labeller, or to two who label independently.'
                  : 'The lead cuts the study area into blocks and gives them to labellers. Samples can be drawn without.'}
              </p>
            ) : (
              <>
                <div className="border-b border-line px-3.5 py-2.5">
                  <PersonProgress blocks={blocks} />
                </div>
                <BlockTable
                  blocks={blocks}
                  nClasses={nClasses}
                  selectedId={selectedId}
                  onSelect={({ id }) => select(id)}
                  onTick={abilities.manage ? tick : undefined}
                  ticked={ticked}
                />
              </>
            )}
          </section>
        }
        map={
          <BlockMap
            scene={scene}
            blocks={blocks}
            selected={selected}
            ticked={ticked}
            tool={isDrawing && !drawn ? 'polygon' : null}
            editor={editor}
            pair={pair}
            onSelect={select}
            onDrawn={setDrawn}
          />
        }
        slip={
          selected && (
            <BlockSlip
              block={selected}
              canManage={abilities.manage}
              onAssign={() => setAssigning([selected.id])}
              onShow={setPairIds}
              onClose={() => select(null)}
            />
          )
        }
      />
      {isCutting && <CutDialog projectId={project.id} nBlocks={blocks.length} onClose={() => setIsCutting(false)} />}
      {drawn && (
        <DrawDialog
          projectId={project.id}
          geometry={drawn}
          onClose={() => {
            setDrawn(null);
            setIsDrawing(false);
          }}
        />
      )}
      {assigning && (
        <AssignDialog
          projectId={project.id}
          blocks={blocks.filter(({ id }) => assigning.includes(id))}
          onClose={() => {
            setAssigning(null);
            setTicked(new Set());
          }}
        />
      )}
    </>
  );
}
