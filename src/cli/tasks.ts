import { type Altered, doVariantTask, legTimes, type VariantTask } from '../racecourse/index.js';
import { doSweepTask, type SweepTask } from './sweep-task.js';

/** An altered boat on every leg of a sensitivity. */
export interface LegsTask {
  readonly kind: 'legs';
  readonly altered: Altered;
  readonly tws: readonly number[];
}

/** Everything a worker can be asked to do. Plain data in, plain data out. */
export type Task = VariantTask | SweepTask | LegsTask;

export function doTask(task: Task): unknown {
  switch (task.kind) {
    case 'sweep':
      return doSweepTask(task);
    case 'legs':
      return doLegsTask(task);
    default:
      return doVariantTask(task);
  }
}

/** Undefined where no boat can be made of the altered figures. */
function doLegsTask(task: LegsTask): number[][] | undefined {
  try {
    return legTimes(task.altered, task.tws);
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}
