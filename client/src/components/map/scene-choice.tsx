import { formatCalendarDate } from '../../lib/format-date.ts';
import { Segmented } from '../ui/segmented.tsx';
import { Select } from '../ui/select.tsx';

export interface SceneChoiceProps {
  scenes: readonly { id: string; name: string; acquiredOn: string | null }[];
  value: string;
  onChange: (sceneId: string) => void;
}

const MOST_SIDE_BY_SIDE = 3;

/** Which scene is on the map; nothing to choose with one. */
export function SceneChoice({ scenes, value, onChange }: SceneChoiceProps) {
  if (scenes.length < 2) return null;
  const long = (scene: SceneChoiceProps['scenes'][number]) =>
    scene.acquiredOn ? `${scene.name}, ${formatCalendarDate(scene.acquiredOn)}` : scene.name;
  if (scenes.length > MOST_SIDE_BY_SIDE || scenes.some((scene) => scene.name.length > 18)) {
    return (
      <Select
        aria-label="Scene"
        size="sm"
        value={value}
        onChange={onChange}
        options={scenes.map((scene) => ({ value: scene.id, label: long(scene) }))}
        className="w-auto! max-w-56"
      />
    );
  }
  return (
    <Segmented
      label="Scene"
      value={value}
      onChange={onChange}
      options={scenes.map((scene) => ({ value: scene.id, label: <span title={long(scene)}>{scene.name}</span> }))}
    />
  );
}
