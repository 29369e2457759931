/** Where a sweep runs. */
export interface SweepHost {
  /** Version of the app. */
  readonly app: string;
  /** The folder that relative paths count from. */
  readonly from: string;
  /** The bundled sweep-thread. */
  readonly threadFile: string;
  /** SOURCE_DATE_EPOCH, where it is set. */
  readonly epoch: string | undefined;
  /** Progress and what went wrong: standard error. */
  readonly say: (line: string) => void;
  /** What came of it: standard output. */
  readonly tell: (line: string) => void;
}
