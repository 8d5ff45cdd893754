import { type QueryClient, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import { type ProjectEvent, projectEventSchema } from '../../../shared/contracts/job.ts';
import { useEventStream } from '../lib/event-stream.ts';
import { patchJob } from '../lib/project/patch-job.ts';
import { type ProjectTopic, projectKey } from '../lib/project/project-query.ts';

/** Changes that come within this time are refetched together. */
const GATHER_MS = 200;

/** What else stands on other pages when a topic changes. */
const TOUCHES: Record<Extract<ProjectEvent, { type: 'changed' }>['what'], readonly ProjectTopic[]> = {
  project: ['project', 'overview'],
  scenes: ['scenes', 'project', 'overview'],
  classes: ['classes', 'samples', 'runs', 'project', 'overview'],
  samples: ['samples', 'blocks', 'classes', 'project', 'overview'],
  runs: ['runs', 'accuracy', 'project', 'overview'],
  members: ['members', 'project', 'overview'],
  // While a design is open, maps and their accuracy are withheld from its interpreters.
  blocks: ['blocks', 'samples', 'overview'],
  presence: ['presence'],
  designs: ['designs', 'runs', 'accuracy', 'overview'],
};

/**
 * Follows what happens in a project: refetches what others changed and moves the bars of work under way.
 *
 * @param projectId null while nobody may listen (no project yet, or a client's page)
 * @returns false while the stream is broken and being mended
 */
export function useProjectEvents(projectId: string | null): boolean {
  const queryClient = useQueryClient();
  const [isOpen, setIsOpen] = useState(true);
  const wasBroken = useRef(false);
  const gathered = useRef(new Set<ProjectTopic>());
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);

  useEffect(() => () => clearTimeout(timer.current), [projectId]);

  const refetchSoon = (id: string, topics: readonly ProjectTopic[]) => {
    for (const topic of topics) gathered.current.add(topic);
    clearTimeout(timer.current);
    timer.current = setTimeout(() => {
      for (const topic of gathered.current) void queryClient.invalidateQueries({ queryKey: projectKey(id, topic) });
      gathered.current.clear();
    }, GATHER_MS);
  };

  useEventStream(projectId && `/projects/${projectId}/events`, {
    schema: projectEventSchema,
    onMessage: (event) => {
      if (projectId) refetchSoon(projectId, receiveProjectEvent(queryClient, projectId, event));
    },
    onConnection: (open) => {
      setIsOpen(open);
      // What happened meanwhile may be beyond what the server replays.
      if (open && wasBroken.current) void queryClient.invalidateQueries({ queryKey: ['project', projectId] });
      wasBroken.current = !open;
    },
    // An event this page cannot read (it is older than the server) may be about anything: everything is asked again.
    onFault: () => void queryClient.invalidateQueries({ queryKey: ['project', projectId] }),
  });
  return isOpen;
}

/** Puts an event into the cache and names the topics to ask for again. */
export function receiveProjectEvent(
  queryClient: QueryClient,
  projectId: string,
  event: ProjectEvent,
): readonly ProjectTopic[] {
  if (event.type === 'changed') return TOUCHES[event.what];
  const { job } = event;
  for (const [topic, subjectId] of [
    ['scenes', event.sceneId],
    ['runs', event.runId],
  ] as const) {
    if (!subjectId) continue;
    queryClient.setQueriesData({ queryKey: projectKey(projectId, topic) }, (data: unknown) =>
      patchJob(data, subjectId, job),
    );
    const hasEnded = job.state !== 'queued' && job.state !== 'running';
    if (hasEnded) return TOUCHES[topic];
  }
  return [];
}
