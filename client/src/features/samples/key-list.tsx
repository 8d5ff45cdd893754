import { Dialog } from '../../components/ui/dialog.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';

const GROUPS: { title: string; keys: [string[], string][] }[] = [
  {
    title: 'Tools',
    keys: [
      [['P'], 'Draw a polygon'],
      [['F'], 'Draw freehand along an edge'],
      [['R'], 'Draw a rectangle, corner to corner'],
      [['C'], 'Draw a circle, middle to edge'],
      [['G'], 'Grow a drawing from a pixel'],
      [['V'], 'Select and change'],
      [['I'], 'Inspect a pixel; or Alt and a press at any time'],
      [['M'], 'Open or close the sample list'],
      [['B'], 'Go to your next block'],
      [['1', '…', '9', '0'], 'Class, in the order of the scheme'],
    ],
  },
  {
    title: 'A drawing',
    keys: [
      [['Enter'], 'Close the polygon; then save the sample'],
      [['Backspace'], 'Take back the last corner'],
      [['Esc'], 'Leave the drawing, close what is open'],
      [['Right press'], 'Take a corner out while changing'],
      [['Ctrl', 'Z'], 'Undo, saved changes too'],
      [['Ctrl', 'Shift', 'Z'], 'Do again'],
    ],
  },
  {
    title: 'Without a mouse',
    keys: [
      [['←', '↑', '→', '↓'], 'Move the map; while drawing, the crosshair'],
      [['Shift', '→'], 'Move farther'],
      [['Ctrl', '→'], 'Move the crosshair by one screen pixel'],
      [['Space'], 'Set a corner at the crosshair; while changing, pick up a corner, and drop it'],
      [['+', '−'], 'Zoom'],
    ],
  },
  {
    title: 'A selected sample',
    keys: [
      [['E'], 'Change its outline, class, confidence or note'],
      [['Delete'], 'Delete it; undo brings it back'],
    ],
  },
];

/** Every key of the desk. */
export function KeyList({ onClose }: { onClose: () => void }) {
  return (
    <Dialog isOpen onOpenChange={(isOpen) => !isOpen && onClose()} title="Keys of the sampling desk" size="lg">
      <div className="grid grid-cols-2 gap-x-8 gap-y-5 max-md:grid-cols-1">
        {GROUPS.map((group) => (
          <section key={group.title}>
            <h3 className="mb-1.5 font-semibold">{group.title}</h3>
            <dl className="grid grid-cols-[auto_1fr] items-baseline gap-x-4 gap-y-1.5">
              {group.keys.map(([keys, text]) => (
                <div key={text} className="contents">
                  <dt className="flex gap-1">
                    {keys.map((key) => (
                      <Kbd key={key}>{key}</Kbd>
                    ))}
                  </dt>
                  <dd>{text}</dd>
                </div>
              ))}
            </dl>
          </section>
        ))}
      </div>
    </Dialog>
  );
}
