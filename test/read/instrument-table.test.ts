import { describe, expect, it } from 'vitest';
import { readFile } from '../../workers/read/read-file.ts';

const read = (text: string) =>
  readFile({ jobId: '', fileName: 'dumps.csv', bytes: new TextEncoder().encode(text).buffer as ArrayBuffer });

describe('a table of times of the instrument', () => {
  it('is known by its starts and ends, sorted, with its notes', async () => {
    const outcome = await read('start,end,what\n12.5,12.75,slew\n3,3.5,wheel\n');
    expect(outcome).toMatchObject({
      kind: 'done',
      value: {
        kind: 'instrument times',
        spans: [
          { start: 3, end: 3.5, note: 'wheel' },
          { start: 12.5, end: 12.75, note: 'slew' },
        ],
        warnings: [],
      },
    });
  });

  it('says how many rows it could not use', async () => {
    const outcome = await read('t_start,t_end\n1,2\n5,4\n,7\n');
    expect(outcome).toMatchObject({ kind: 'done', value: { spans: [{ start: 1, end: 2 }] } });
    expect(outcome.kind === 'done' && outcome.value.kind === 'instrument times' && outcome.value.warnings).toEqual([
      'dumps.csv: 2 rows without a start and a later end were left out.',
    ]);
  });

  it('is refused by name where no row is of use', async () => {
    const outcome = await read('start,end\n5,4\n6,1\n');
    expect(outcome).toMatchObject({ kind: 'failed' });
    expect(outcome.kind === 'failed' && outcome.error.sentence).toContain('dumps.csv was not read');
  });
});
