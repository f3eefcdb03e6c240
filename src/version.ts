import { createRequire } from 'node:module';

/** This package's version, as its package.json says; it stands in every table. */
export const VERSION: string = (createRequire(import.meta.url)('../package.json') as { version: string })
  .version;
