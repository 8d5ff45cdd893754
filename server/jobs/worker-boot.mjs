// Worker threads of Node 20 can't load TypeScript by themselves: this registers tsx first. Used from sources only;
// a compiled server starts its workers from the compiled entry.
import { workerData } from 'node:worker_threads';
import { register } from 'tsx/esm/api';

register();
const entry = await import(workerData.workerEntry);
export default entry.default;
