import { isMainThread } from 'node:worker_threads';

// Loaded into the server ahead of its own code: when the launcher is killed, the channel to it closes, and the server
// closes too instead of living on with the port and the database nobody looks after.
if (isMainThread && process.channel !== undefined && process.channel !== null) {
  process.once('disconnect', () => process.kill(process.pid, 'SIGTERM'));
  process.channel.unref();
}
