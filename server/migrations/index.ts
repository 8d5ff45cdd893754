import { Init1796099110473 } from './1796099110473-init.ts';

/** In the order they run; a new one goes to the end. */
export const migrations = [Init1796099110473];
