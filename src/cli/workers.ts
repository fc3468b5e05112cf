import { availableParallelism } from 'node:os';
import { Worker } from 'node:worker_threads';
import { UsageError } from './errors.js';
import { doTask, type Task } from './tasks.js';
import type { Answer } from './worker.js';

/** Most workers that may be asked for. */
const MOST_WORKERS = 256;

/** Reads the number of workers; left out: one for every core. @throws UsageError */
export function readWorkers(text: string | undefined): number {
  if (text === undefined) return availableParallelism();
  const n = Number(text.trim());
  if (!/^\d+$/.test(text.trim()) || n < 1 || n > MOST_WORKERS)
    throw new UsageError(`--workers: "${text}" is not a whole number from 1 to ${MOST_WORKERS}`);
  return n;
}

/**
 * Does the tasks on worker threads (on this thread where one worker is enough). What a task answers depends on the
 * task alone, so the number of workers changes nothing but the time.
 * @param next the next task, or undefined when there are no more
 * @param done takes each answer as it comes, with its task's number in the order of asking
 */
export async function runTasks(
  next: () => Task | undefined,
  workers: number,
  done: (number: number, result: unknown) => void,
): Promise<void> {
  const own = new URL(import.meta.url);
  // Run from its TypeScript sources there is no compiled worker: all on this thread.
  if (workers <= 1 || own.pathname.endsWith('.ts')) {
    for (let number = 0, task = next(); task !== undefined; task = next()) done(number++, doTask(task));
    return;
  }
  let number = 0;
  const team: Worker[] = [];
  const serve = (worker: Worker): Promise<void> =>
    new Promise((resolve, reject) => {
      let current = -1;
      const give = (): void => {
        const task = next();
        if (task === undefined) {
          resolve();
          return;
        }
        current = number++;
        worker.postMessage(task);
      };
      worker.on('message', (answer: Answer) => {
        if (!answer.ok) {
          const error = new Error(answer.message);
          error.stack = answer.stack;
          reject(error);
          return;
        }
        try {
          done(current, answer.result);
          give();
        } catch (error) {
          reject(error);
        }
      });
      worker.on('error', reject);
      worker.on('exit', (code) => reject(new Error(`a worker ended with code ${code}`)));
      give();
    });
  try {
    for (let i = 0; i < workers; i++) team.push(new Worker(new URL('./worker.js', own)));
    await Promise.all(team.map(serve));
  } finally {
    await Promise.all(team.map((w) => w.terminate()));
  }
}

/** Does a known list of tasks; the answers in the order of the tasks. */
export async function runAll<R>(
  tasks: readonly Task[],
  workers: number,
  progress: (done: number) => void = () => {},
): Promise<R[]> {
  const results: R[] = new Array(tasks.length);
  let i = 0;
  let count = 0;
  await runTasks(
    () => tasks[i++],
    Math.min(workers, tasks.length),
    (number, result) => {
      results[number] = result as R;
      progress(++count);
    },
  );
  return results;
}
