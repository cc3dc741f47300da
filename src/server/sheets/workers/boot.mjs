/** Workers do not inherit the loader for TypeScript: this file registers it, then starts the worker. */
import { register } from 'tsx/esm/api';

register();
await import('./entry.ts');
