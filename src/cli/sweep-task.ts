export interface SweepTask {
  readonly kind: 'sweep';
}
export function doSweepTask(_task: SweepTask): unknown {
  return undefined;
}
