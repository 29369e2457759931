import { describe, expect, it } from 'vitest';
import { assignRole, whyNotReadable } from '../../src/intake/edit-mapping.ts';
import { fileOf } from '../session/session-arbitrary.ts';

const base = {
  ...fileOf(1).mapping,
  columns: [
    { column: 'a', role: 'time', reason: '' },
    { column: 'b', role: 'flux', meaning: 'raw', unit: 'ppm', reason: '' },
    { column: 'c', role: 'flux error', errorOf: 'b', reason: '' },
  ],
} as const;
const roles = (mapping: ReturnType<typeof assignRole>) => mapping.columns.map(({ role }) => role);

describe('correcting columns', () => {
  it('keeps one time only', () => expect(roles(assignRole(base, 'c', 'time'))).toEqual(['covariate', 'flux', 'time']));

  it('frees an error whose flux is no flux any more', () =>
    expect(assignRole(base, 'b', 'ignore').columns[2]!.errorOf).toBeUndefined());

  it('says what is still missing', () => {
    expect(whyNotReadable(base)).toBeUndefined();
    expect(whyNotReadable(assignRole(base, 'a', 'ignore'))).toContain('time');
    expect(whyNotReadable(assignRole(base, 'b', 'ignore'))).toContain('flux');
  });
});
