import 'server-only';

let stopped: Date | undefined;

/** The present. */
export function now(): Date {
  return stopped ?? new Date();
}

/** Lets the demonstration's scenario and tests tell the time; without an argument the clock runs again. */
export function setClock(at?: Date): void {
  stopped = at;
}
