import type { Response } from 'express';
import type { ProjectEvent } from '../../../shared/contracts/job.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';
import { mayGoOn } from './watch-authority.ts';

/** Also how soon a stream ends whose session was ended or whose account was closed. */
const KEEP_ALIVE_MS = 15_000;
/** A browser that does not read is hung up on; it comes back with Last-Event-ID when it can. */
const MAX_UNREAD_BYTES = 1024 * 1024;

function write(res: Response, text: string): void {
  if (res.writableLength > MAX_UNREAD_BYTES) res.destroy();
  else res.write(text);
}

export const eventRoutes = [
  route({
    id: 'events.stream',
    method: 'get',
    path: '/projects/:projectId/events',
    summary: 'What happens in the project, as server-sent events; Last-Event-ID replays what was missed',
    access: { kind: 'project', action: 'overview.read', find: findProjectTarget },
    params: projectParams,
    answer: { mediaType: 'text/event-stream' },
    async handle({ app, params: { projectId }, viewer, req, res }) {
      res.writeHead(200, {
        'Content-Type': 'text/event-stream',
        'Cache-Control': 'no-store',
        'X-Accel-Buffering': 'no',
      });
      res.write('retry: 2000\n\n');
      // Events wait in line behind a look at the authority, so that none reaches someone who was just taken out.
      let line = Promise.resolve();
      const then = (work: () => void | Promise<void>) => {
        line = line
          .then(() => (isOver ? undefined : work()))
          .catch((error: unknown) => {
            app.log.error({ err: error }, 'an event stream failed');
            res.destroy();
          });
      };
      // The answer's own mark comes late: its end waits for the session to be written.
      let isOver = false;
      const look = async () => {
        if (await mayGoOn(app, req, projectId, viewer.userId)) return;
        isOver = true;
        res.end();
      };
      const send = ({ id, event }: { id: number; event: ProjectEvent }) => {
        if (event.type === 'changed' && event.what === 'members') then(look);
        then(() => write(res, `id: ${id}\ndata: ${JSON.stringify(event)}\n\n`));
      };
      let unsubscribe: (() => void) | null = null;
      const keepAlive = setInterval(() => {
        then(look);
        then(() => write(res, ': still here\n\n'));
      }, KEEP_ALIVE_MS);
      res.on('close', () => {
        isOver = true;
        clearInterval(keepAlive);
        unsubscribe?.();
      });
      const lastId = Number(req.get('last-event-id') ?? Number.NaN);
      unsubscribe = await app.events.subscribe(projectId, Number.isFinite(lastId) ? lastId : null, send);
      // The browser may have left while what it missed was read.
      if (isOver) unsubscribe();
      return undefined;
    },
  }),
];
