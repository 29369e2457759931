import * as v from 'valibot';
import type { SessionDocument } from './document.ts';
import { sessionSchema } from './schema.ts';
import { CURRENT_VERSION, upgrade } from './upgrade.ts';

export type SessionRead =
  | { readonly kind: 'read'; readonly document: SessionDocument }
  | { readonly kind: 'refused'; readonly sentence: string };

/** A session file's document, or why it cannot be one: in words, with the place that is wrong. */
export function readSession(text: string, fileName: string): SessionRead {
  const refuse = (why: string): SessionRead => ({
    kind: 'refused',
    sentence: `${fileName} was not opened. ${why} Nothing was changed.`,
  });
  const parsed = parseJson(text);
  if (parsed.kind === 'broken') return refuse(`It is not JSON: ${parsed.why}.`);
  const { value } = parsed;
  if (!isRecord(value) || value.format !== 'candling-session')
    return refuse('It is JSON, but no Candling session: "format" should be "candling-session".');
  if (typeof value.version !== 'number') return refuse('It does not say which version of the session format it is.');
  if (value.version > CURRENT_VERSION)
    return refuse(
      `It was written by a newer Candling (session format ${value.version}); this one reads up to ${CURRENT_VERSION}.`,
    );
  const result = v.safeParse(sessionSchema, upgrade(value));
  if (!result.success) return refuse(issueInWords(result.issues[0]));
  const contradiction = findContradiction(result.output);
  return contradiction === undefined ? { kind: 'read', document: result.output } : refuse(contradiction);
}

function parseJson(text: string): { kind: 'parsed'; value: unknown } | { kind: 'broken'; why: string } {
  try {
    return { kind: 'parsed', value: JSON.parse(text) };
  } catch (cause) {
    return { kind: 'broken', why: cause instanceof Error ? cause.message : String(cause) };
  }
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** "targets, 4th, cases, 1st, timing.periodDays: expected a number greater than 0, found −3." */
function issueInWords(issue: v.BaseIssue<unknown>): string {
  const place = v.getDotPath(issue);
  const words = (place ?? '').split('.').map((part) => (/^\d+$/.test(part) ? ordinal(Number(part) + 1) : part));
  const expected = issue.expected === null ? issue.message : `expected ${issue.expected}`;
  return `${words.join(', ') || 'The document'}: ${expected}, found ${issue.received}.`;
}

function ordinal(number: number): string {
  const ending = number % 100 > 10 && number % 100 < 14 ? 'th' : ({ 1: 'st', 2: 'nd', 3: 'rd' }[number % 10] ?? 'th');
  return `${number}${ending}`;
}

/** What types cannot say: names that must be unique, numbers that must agree. */
function findContradiction(document: SessionDocument): string | undefined {
  const ids = document.targets.map(({ id }) => id);
  if (new Set(ids).size < ids.length) return 'Two targets have the same id.';
  for (const { label, cases, lastCaseNumber } of document.targets) {
    const numbers = cases.map(({ number }) => number);
    if (new Set(numbers).size < numbers.length) return `Target ${label} has two cases of one number.`;
    if (Math.max(0, ...numbers) > lastCaseNumber)
      return `Target ${label} has a case of a higher number than its lastCaseNumber.`;
  }
  return undefined;
}
