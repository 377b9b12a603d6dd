// The entry of a worker thread: on Node 20 `--import tsx` does not reach the entry file of a thread.
import { register } from 'tsx/esm/api';

register();
await import('./batch.serve.ts');
