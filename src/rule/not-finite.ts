/** Where on which path a value stopped being a finite number. */
export interface NotFinitePlace {
  readonly what: string;
  /** Line of the scenario that the value comes from. */
  readonly line: number | null;
  /** Number of the path within its purpose, from 0. */
  readonly path: number;
  readonly date: number;
  readonly time: number;
}

/** Ends a job whose numbers stopped being finite; turned back into data at the job's edge. */
export class NotFinite extends Error {
  constructor(readonly place: NotFinitePlace) {
    super(`${place.what} is not finite`);
  }
}
