import { readConfig } from '../config.ts';
import { createDataSource } from '../data-source.ts';

/** What TypeORM's command line connects with; make-migration.mjs gives it a database of its own. */
export default createDataSource(readConfig(process.env).db);
