import { readTyped } from './typed-number.ts';

export const HOURS_A_DAY = 24;

export interface HandTimingFields {
  readonly kind: 'linear' | 'single';
  readonly period: string;
  readonly epoch: string;
  /** Duration in hours. */
  readonly hours: string;
}

export type HandTiming =
  | {
      readonly kind: 'linear';
      readonly periodDays: number;
      readonly epochDays: number;
      readonly durationDays: number;
    }
  | { readonly kind: 'single'; readonly epochDays: number; readonly durationDays: number };

/** The timing that the fields of the form give; undefined while they give none. */
export function readHandTiming(fields: HandTimingFields): HandTiming | undefined {
  const epoch = readTyped(fields.epoch, false);
  const hours = readTyped(fields.hours, true);
  if (epoch.kind === 'refused' || hours.kind === 'refused') return undefined;
  const shared = { epochDays: epoch.value, durationDays: hours.value / HOURS_A_DAY };
  if (fields.kind === 'single') return { kind: 'single', ...shared };
  const period = readTyped(fields.period, true);
  if (period.kind === 'refused' || period.value <= shared.durationDays) return undefined;
  return { kind: 'linear', periodDays: period.value, ...shared };
}
