/** A job as routes answer it; the event stream carries the same. */
export { presentJob } from '../jobs/job-event.ts';
