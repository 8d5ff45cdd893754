import { ClassKeys, type ClassKey } from '../../components/layout/class-keys.tsx';
import { Strip, ToolButton, ToolGap } from '../../components/layout/map-page.tsx';
import { DESK_TOOLS, type DeskTool } from './desk-tool.ts';

export interface DeskStripProps {
  canDraw: boolean;
  /** Said instead of drawing tools. */
  whyNot: string;
  /** How the tool in hand is used. */
  help: string | null;
  tool: DeskTool;
  onTool: (tool: DeskTool) => void;
  keys: readonly ClassKey[];
  target: number | null;
  classId: string | null;
  onClass: (classId: string) => void;
  canUndo: boolean;
  canRedo: boolean;
  onUndo: () => void;
  onRedo: () => void;
  onKeyList: () => void;
}

/** The key strip: tools above, one key a class below. */
export function DeskStrip(props: DeskStripProps) {
  const { canDraw, whyNot, tool, onTool, keys, target, classId, onClass } = props;
  const tools = DESK_TOOLS.filter((one) => canDraw || !one.draws);
  return (
    <Strip
      label="Drawing tools and classes"
      tools={
        <>
          {tools.map((one) => (
            <ToolButton
              key={one.tool}
              label={one.label}
              shortcut={one.key}
              isOn={tool === one.tool}
              onPress={() => onTool(one.tool)}
            />
          ))}
          {!canDraw && <span className="ml-2 text-ink-soft">{whyNot}</span>}
          <ToolGap />
          {canDraw && (
            <>
              <ToolButton label="Undo" shortcut="⌃Z" isDisabled={!props.canUndo} onPress={props.onUndo} />
              <ToolButton label="Redo" shortcut="⌃⇧Z" isDisabled={!props.canRedo} onPress={props.onRedo} />
            </>
          )}
          <ToolButton label="Keys" shortcut="?" onPress={props.onKeyList} />
        </>
      }
    >
      <p role="status" className={props.help ? 'border-b border-line px-3.5 py-1 text-xs text-ink-soft' : 'sr-only'}>
        {props.help}
      </p>
      <ClassKeys
        keys={keys}
        target={target}
        selectedId={classId}
        onSelect={onClass}
        label={canDraw ? 'Class to draw' : 'Show one class alone'}
      />
    </Strip>
  );
}
