import { describe, expect, it } from 'vitest';
import { caseLook, drawCaseShape } from '../../src/plot/case-shape.ts';
import { SvgContext } from '../../src/plot/svg-context.ts';
import { TEST_THEME } from './test-theme.ts';

function outline(caseNumber: number): string {
  const context = new SvgContext('s');
  drawCaseShape(context, TEST_THEME, caseLook(caseNumber, TEST_THEME), 0, 0, 4);
  return / d="([^"]*)"/.exec(context.toSvg(10, 10, ''))![1]!;
}

describe('case shapes', () => {
  const numbers = [1, 2, 3, 4, 5, 6, 7, 8];

  it('tell eight cases apart by outline and by dash', () => {
    expect(new Set(numbers.map(outline)).size).toBe(8);
    expect(new Set(numbers.map((number) => caseLook(number, TEST_THEME).dash.join(' '))).size).toBe(8);
    expect(caseLook(1, TEST_THEME).dash).toEqual([]);
  });
  it('have the corners of their names', () => {
    const corners = (number: number) => outline(number).match(/[ML]/g)?.length;
    expect([3, 4, 5, 6, 8].map(corners)).toEqual([3, 4, 3, 6, 10]);
    expect(outline(3)).toMatch(/^M0 -/);
    expect(outline(5)).toMatch(/^M0 [^-]/);
  });
  it('come again hollow from the ninth', () => {
    expect(caseLook(8, TEST_THEME).hollow).toBe(false);
    expect(caseLook(9, TEST_THEME)).toMatchObject({ shape: 'circle', hollow: true });
    expect(caseLook(undefined, TEST_THEME).hollow).toBe(true);
  });
});
