import type { ColumnAssignment, ColumnRole, FileMapping } from '../core/file-mapping.ts';

/** The same mapping with one column taken for something else. There is one time: another one gives way. */
export function assignRole(mapping: FileMapping, column: string, role: ColumnRole): FileMapping {
  const columns = mapping.columns.map((assignment): ColumnAssignment => {
    if (assignment.column === column)
      return { ...assignment, role, reason: 'set by hand', ...(role === 'flux' ? withMeaning(assignment) : {}) };
    return role === 'time' && assignment.role === 'time' ? { ...assignment, role: 'covariate' } : assignment;
  });
  return { ...mapping, columns: columns.map((assignment) => keepPaired(assignment, columns)) };
}

export function changeColumn(mapping: FileMapping, column: string, change: Partial<ColumnAssignment>): FileMapping {
  const columns = mapping.columns.map((assignment) =>
    assignment.column === column ? { ...assignment, ...change } : assignment,
  );
  return { ...mapping, columns };
}

/** Why a file cannot be read so yet; undefined where it can. */
export function whyNotReadable({ columns }: FileMapping): string | undefined {
  const has = (role: ColumnRole) => columns.some((assignment) => assignment.role === role);
  if (!has('time')) return 'Choose the column that is time.';
  return has('flux') ? undefined : 'Choose at least one column that is flux.';
}

function withMeaning({ meaning, unit }: ColumnAssignment): Partial<ColumnAssignment> {
  return { meaning: meaning ?? 'unknown', unit: unit ?? 'unknown' };
}

/** An error whose flux is no longer one goes with every flux. */
function keepPaired(assignment: ColumnAssignment, columns: readonly ColumnAssignment[]): ColumnAssignment {
  if (assignment.errorOf === undefined) return assignment;
  const flux = columns.find(({ column }) => column === assignment.errorOf);
  return flux?.role === 'flux' ? assignment : { ...assignment, errorOf: undefined };
}
