/** What every worker job promises: it ends in exactly one of three ways, and expected failures are values. */
export type Outcome<T> =
  | { readonly kind: 'done'; readonly value: T }
  | { readonly kind: 'cancelled' }
  | { readonly kind: 'failed'; readonly error: JobError };

export interface JobError {
  /** For the analyst: what was wrong, where, and what to do. */
  readonly sentence: string;
  /** For the developer: a stack or a name. */
  readonly detail?: string | undefined;
}

export interface Progress {
  readonly done: number;
  readonly total: number;
}

export type OnProgress = (progress: Progress) => void;

export const done = <T>(value: T): Outcome<T> => ({ kind: 'done', value });
export const failed = (sentence: string, detail?: string): Outcome<never> => ({
  kind: 'failed',
  error: { sentence, detail },
});
export const cancelled: Outcome<never> = { kind: 'cancelled' };
