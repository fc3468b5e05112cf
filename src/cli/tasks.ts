import { doVariantTask, type VariantTask } from '../racecourse/index.js';
import { doSweepTask, type SweepTask } from './sweep-task.js';

/** Everything a worker can be asked to do. Plain data in, plain data out. */
export type Task = VariantTask | SweepTask;

export function doTask(task: Task): unknown {
  return task.kind === 'sweep' ? doSweepTask(task) : doVariantTask(task);
}
