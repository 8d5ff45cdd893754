import type { Presence } from '../../../../shared/contracts/presence.ts';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import { AreaOutline } from '../../components/map/area-outline.tsx';

/** Who else has the desk open, by initials; the name at the pointer and read out. */
export function PresenceMarks({ people }: { people: readonly Presence[] }) {
  const persons = new Map(people.map(({ person }) => [person.id, person.name]));
  if (persons.size === 0) return null;
  return (
    <ul aria-label="Also at the desk" className="flex -space-x-1.5">
      {[...persons].map(([id, name]) => (
        <li key={id}>
          <span
            title={`${name} is at the desk`}
            className="inline-flex size-7 items-center justify-center rounded-full border-2 border-paper bg-spruce text-2xs font-semibold text-paper"
          >
            <span aria-hidden>{initials(name)}</span>
            <span className="sr-only">{name}</span>
          </span>
        </li>
      ))}
    </ul>
  );
}

/** Outlines of what others are changing just now, with their names. */
export function EditedByOthers({ people, samples }: { people: readonly Presence[]; samples: readonly Sample[] }) {
  return people.map(({ person, editingSampleId }) => {
    const sample = samples.find(({ id }) => id === editingSampleId);
    return (
      sample && <AreaOutline key={person.id} geometry={sample.geometry} label={`${person.name} is changing this`} />
    );
  });
}

function initials(name: string): string {
  const words = name.trim().split(/\s+/);
  return ((words[0]?.[0] ?? '') + (words.length > 1 ? (words.at(-1)?.[0] ?? '') : '')).toUpperCase();
}
