/** Turns a document of one version into one of the next. */
export type Upgrader = (document: Record<string, unknown>) => Record<string, unknown>;

export const CURRENT_VERSION = 1;

/** By the version that each one upgrades from. */
const UPGRADERS: Readonly<Record<number, Upgrader>> = {};

/** A document of any older version, step by step up to the wanted one; as it is where a step is missing. */
export function upgrade(
  document: Record<string, unknown>,
  upgraders: Readonly<Record<number, Upgrader>> = UPGRADERS,
  wanted: number = CURRENT_VERSION,
): Record<string, unknown> {
  let current = document;
  while (typeof current.version === 'number' && current.version < wanted) {
    const step = upgraders[current.version];
    if (step === undefined) return current;
    current = { ...step(current), version: current.version + 1 };
  }
  return current;
}
