import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

const KEEP_ALIVE_MS = 20_000;

export const eventRoutes = [
  route({
    id: 'events.stream',
    method: 'get',
    path: '/projects/:projectId/events',
    summary: 'What happens in the project, as server-sent events; Last-Event-ID replays what was missed',
    access: { kind: 'project', action: 'overview.read', find: findProjectTarget },
    params: projectParams,
    answer: { mediaType: 'text/event-stream' },
    async handle({ app, params, req, res }) {
      res.writeHead(200, {
        'Content-Type': 'text/event-stream',
        'Cache-Control': 'no-store',
        'X-Accel-Buffering': 'no',
      });
      res.write('retry: 2000\n\n');
      const lastId = Number(req.get('last-event-id') ?? Number.NaN);
      const unsubscribe = await app.events.subscribe(
        params.projectId,
        Number.isFinite(lastId) ? lastId : null,
        ({ id, event }) => {
          res.write(`id: ${id}\ndata: ${JSON.stringify(event)}\n\n`);
        },
      );
      const keepAlive = setInterval(() => res.write(': still here\n\n'), KEEP_ALIVE_MS);
      res.on('close', () => {
        clearInterval(keepAlive);
        unsubscribe();
      });
      return undefined;
    },
  }),
];
