import { type PlotTheme, themeFrom } from '../../src/plot/theme.ts';

/** A theme of plain colours: tests look at shapes and words, not at the page's tokens. */
export const TEST_THEME: PlotTheme = themeFrom((name) => {
  if (name === '--seq') return '#000000,#202020,#404040,#808080,#ffffff';
  if (name.startsWith('--font')) return 'sans-serif';
  return name === '--point' ? '#ff0000' : '#123456';
});
