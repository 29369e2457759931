import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { countPoints, makeDensityGrid, paintDensity, resetDensityGrid } from '../../src/plot/density-grid.ts';
import { displayExtent } from '../../src/plot/display-extent.ts';
import type { DrawContext, PixelBlock } from '../../src/plot/draw-context.ts';
import { makeFrame } from '../../src/plot/frame.ts';
import { drawPoints } from '../../src/plot/points-layer.ts';
import { linearScale, toPx } from '../../src/plot/scale.ts';
import { packColour } from '../../src/plot/theme.ts';
import { seededNoise } from './seeded-noise.ts';
import { TEST_THEME } from './test-theme.ts';

const WIDTH = 23;
const HEIGHT = 11;

/** The slow way: every pixel asks every point. */
function naiveCounts(x: number[], y: number[], hide: boolean): number[] {
  const xScale = linearScale([0, 10], [0, WIDTH]);
  const yScale = linearScale([-1, 1], [HEIGHT, 0]);
  const counts = new Array<number>(WIDTH * HEIGHT).fill(0);
  x.forEach((value, i) => {
    const column = Math.floor(toPx(xScale, value));
    const yPx = toPx(yScale, y[i]!);
    if (Number.isNaN(yPx) || column < 0 || column >= WIDTH || Number.isNaN(column)) return;
    if (hide && (yPx < 0 || yPx > HEIGHT)) return;
    counts[Math.min(HEIGHT - 1, Math.max(0, Math.floor(yPx))) * WIDTH + column]! += 1;
  });
  return counts;
}

describe('countPoints', () => {
  // Multiples of 1/64 are exact, so that the fast and the slow way cannot differ by a rounding at a pixel's edge.
  const point = fc.tuple(
    fc.integer({ min: -64, max: 704 }),
    fc.oneof(fc.integer({ min: -90, max: 90 }), fc.constant(Number.NaN)),
  );
  it.each(['edge', 'hide'] as const)('counts as the slow way does, outside: %s', (outside) => {
    fc.assert(
      fc.property(fc.array(point, { maxLength: 300 }), (points) => {
        const x = points.map(([value]) => value / 64 + 1 / 256);
        const y = points.map(([, value]) => value / 64 + 1 / 256);
        const grid = makeDensityGrid();
        resetDensityGrid(grid, WIDTH, HEIGHT);
        const [xScale, yScale] = [linearScale([0, 10], [58, 58 + WIDTH]), linearScale([-1, 1], [40 + HEIGHT, 40])];
        countPoints(grid, Float64Array.from(x), Float64Array.from(y), 0, x.length, xScale, yScale, outside);
        const naive = naiveCounts(x, y, outside === 'hide');
        expect([...grid.counts]).toEqual(naive);
        for (let column = 0; column < WIDTH; column += 1) {
          const rows = Array.from({ length: HEIGHT }, (_, row) => row).filter(
            (row) => naive[row * WIDTH + column]! > 0,
          );
          expect(grid.lowestRow[column]).toBe(rows.at(-1) ?? -1);
          expect(grid.highestRow[column]).toBe(rows[0] ?? -1);
        }
      }),
    );
  });
  it('starts afresh after a reset', () => {
    const grid = makeDensityGrid();
    for (let pass = 0; pass < 2; pass += 1) {
      resetDensityGrid(grid, 4, 4);
      countPoints(
        grid,
        Float64Array.of(0.5),
        Float64Array.of(0.5),
        0,
        1,
        linearScale([0, 1], [0, 4]),
        linearScale([0, 1], [4, 0]),
        'edge',
      );
    }
    expect(grid.counts.reduce((sum, count) => sum + count, 0)).toBe(1);
  });
});

describe('paintDensity', () => {
  it('paints lowest and highest of every filled column in full and leaves empty columns clear', () => {
    const grid = makeDensityGrid();
    resetDensityGrid(grid, 3, 8);
    const [x, y] = [Float64Array.of(0.1, 0.1, 0.1, 2.5), Float64Array.of(1, 4, 6, 3)];
    countPoints(grid, x, y, 0, 4, linearScale([0, 3], [0, 3]), linearScale([0, 8], [8, 0]), 'edge');
    const { rgba } = paintDensity(grid, TEST_THEME.density, packColour('#ff0000'));
    const pixels = new Uint32Array(rgba.buffer);
    const column = (c: number) => Array.from({ length: 8 }, (_, row) => pixels[row * 3 + c]!);
    const full = packColour('#ff0000');
    expect(column(0).filter((pixel) => pixel === full)).toHaveLength(2);
    expect(column(0).filter((pixel) => pixel !== 0)).toHaveLength(3);
    expect(column(1).every((pixel) => pixel === 0)).toBe(true);
    expect(column(2).filter((pixel) => pixel !== 0)).toEqual([full]);
  });
});

describe('a dip of three points among 200 000', () => {
  it('stays inside the plot or on its lower edge, and is painted in full', () => {
    const n = 200_000;
    const noise = seededNoise(11);
    const time = Float64Array.from({ length: n }, (_, i) => i * 0.0005);
    const values = Float64Array.from({ length: n }, () => 100 * noise());
    const at = 123_456;
    for (let i = at; i < at + 3; i += 1) values[i] = -40_000;
    const margins = { left: 58, right: 12, top: 8, bottom: 22 };
    const frame = makeFrame({
      widthPx: 768,
      heightPx: 182,
      margins,
      xDomain: [0, 100],
      yDomain: displayExtent(values, 0, n),
    });
    let painted: PixelBlock | undefined;
    const context = {
      drawPixels: (block: PixelBlock) => {
        painted = block;
      },
    } as unknown as DrawContext;
    const cloud = { x: time, y: values, from: 0, to: n, inside: n, outside: 'edge' } as const;
    drawPoints(context, frame, cloud, TEST_THEME, makeDensityGrid());
    const column = Math.floor(toPx(frame.x, time[at]!) - frame.left);
    const pixels = new Uint32Array(painted!.rgba.buffer);
    const rows = Array.from({ length: painted!.height }, (_, row) => pixels[row * painted!.width + column]!);
    const lowest = rows.findLastIndex((pixel) => pixel !== 0);
    expect(rows[lowest]).toBe(packColour(TEST_THEME.point));
    // Far under the noise of the neighbouring column, whose lowest point is some 4.5 sigma down.
    const beside = Array.from({ length: painted!.height }, (_, row) => pixels[row * painted!.width + column + 3]!);
    expect(lowest).toBeGreaterThan(beside.findLastIndex((pixel) => pixel !== 0) + 2);
  });
});

describe('displayExtent', () => {
  it('shows a deep eclipse whole', () => {
    const noise = seededNoise(3);
    const values = Float64Array.from({ length: 20_000 }, (_, i) => noise() + (i % 1000 < 8 ? -400 : 0));
    expect(displayExtent(values, 0, values.length)[0]).toBeLessThan(-400);
  });
  it('is not squeezed by a flare or by three strays below', () => {
    const noise = seededNoise(4);
    const values = Float64Array.from({ length: 20_000 }, () => noise());
    values[5] = 1e6;
    for (const i of [100, 7000, 15_000]) values[i] = -1e6;
    const [low, high] = displayExtent(values, 0, values.length);
    expect(high).toBeLessThan(10);
    expect(low).toBeGreaterThan(-10);
  });
  it('passes over NaN and stands without data', () => {
    expect(displayExtent(Float64Array.of(Number.NaN, 1, 3), 0, 3)).toEqual([
      expect.closeTo(0.88, 9),
      expect.closeTo(3.12, 9),
    ]);
    expect(displayExtent(new Float64Array(0), 0, 0)).toEqual([-1, 1]);
    const [low, high] = displayExtent(Float64Array.of(5, 5), 0, 2);
    expect(high).toBeGreaterThan(low);
  });
});
