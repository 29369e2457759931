import { describe, expect, it } from 'vitest';
import { packColour, themeFrom } from '../../src/plot/theme.ts';

/** Relative luminance as in WCAG 2.2, of a colour packed as `packColour` does. */
function luminance(packed: number): number {
  const [r, g, b] = [0, 8, 16].map((shift) => {
    const part = ((packed >>> shift) & 255) / 255;
    return part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
}

function contrast(a: number, b: number): number {
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y);
  return (high! + 0.05) / (low! + 0.05);
}

describe('a plot theme', () => {
  it('packs red in the lowest byte, opaque', () => {
    expect(packColour('#010203')).toBe(0xff030201);
  });
  it('never takes a length or nothing for a colour', () => {
    const theme = themeFrom((name) => (name === '--point' ? '1.5px' : name === '--ink' ? '#ebe6da' : ''));
    expect([theme.point, theme.bin, theme.ink]).toEqual(['gray', 'gray', '#ebe6da']);
  });
  it.each([
    ['dark', '#040808', '#030809,#01221f,#043f31,#255c3f,#4e774d,#7a9263,#a5ac85,#cac8b2,#eae7de'],
    ['light', '#fafcfa', '#fafaf8,#d4e0cb,#aac7a8,#7eae8f,#56937c,#37776b,#285957,#233c3e,#1e2122'],
  ])('tells one point from the plot surface at nearly 3 to 1, and more from fewer: %s', (_, plot, seq) => {
    const { density } = themeFrom((name) => (name === '--seq' ? seq : ''));
    const contrasts = [...density].map((level) => contrast(level, packColour(plot)));
    expect(contrasts[0]).toBeGreaterThan(2.9);
    contrasts.slice(1).forEach((value, i) => {
      expect(value).toBeGreaterThan(contrasts[i]!);
    });
  });
});
