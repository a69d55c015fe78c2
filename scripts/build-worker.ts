import { taskBundle } from '@/lib/jobs/task-bundle';

/** Makes the engine's thread ahead of the first run. */
process.stderr.write(`The engine’s thread is ${await taskBundle()}\n`);
