import { parentPort } from 'node:worker_threads';
import { doTask, type Task } from './tasks.js';

/** What a worker answers. */
export type Answer =
  | { readonly ok: true; readonly result: unknown }
  | { readonly ok: false; readonly message: string; readonly stack: string };

parentPort?.on('message', (task: Task) => {
  let answer: Answer;
  try {
    answer = { ok: true, result: doTask(task) };
  } catch (error) {
    const e = error instanceof Error ? error : new Error(String(error));
    answer = { ok: false, message: e.message, stack: e.stack ?? '' };
  }
  parentPort!.postMessage(answer);
});
