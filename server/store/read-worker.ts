import { workerData } from 'node:worker_threads';
import type { DataDirectory } from './data-directory.ts';
import { openToRead } from './database.ts';
import { readCalls } from './read-calls.ts';
import { answerCalls } from './worker-answers.ts';

answerCalls(() => {
  const database = openToRead((workerData as DataDirectory).database);
  return { opened: undefined, calls: readCalls(database, () => void database.close()) };
});
