/** Turns a document of one version into one of the next. */
export type Upgrader = (document: Record<string, unknown>) => Record<string, unknown>;

export const CURRENT_VERSION = 2;

/** By the version that each one upgrades from. */
const UPGRADERS: Readonly<Record<number, Upgrader>> = { 1: addPreparationChoices };

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

/** Version 2 prepares with more choices: what was prepared before is prepared the same after. */
function addPreparationChoices(document: Record<string, unknown>): Record<string, unknown> {
  const recipeOf = (holder: Fields): Fields => ({
    ...holder,
    recipe: { maskFlares: false, splitAtDrops: false, commonModes: 0, ...fieldsOf(holder.recipe) },
  });
  const caseOf = (one: Fields): Fields => ({ ...one, rulings: listOf(one.rulings).map(recipeOf) });
  const targetOf = (target: Fields): Fields => ({ ...recipeOf(target), cases: listOf(target.cases).map(caseOf) });
  return { ...document, targets: listOf(document.targets).map(targetOf), instrumentTables: [], modeSets: [] };
}

type Fields = Record<string, unknown>;

const fieldsOf = (value: unknown): Fields => (typeof value === 'object' && value !== null ? (value as Fields) : {});

/** What is no list, or holds what is no object, is left for the schema to refuse. */
const listOf = (value: unknown): Fields[] => (Array.isArray(value) ? value.map(fieldsOf) : []);
