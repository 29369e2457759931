import type { DrawContext } from '../draw-context.ts';
import type { Frame } from '../frame.ts';
import { listenToPlot } from '../interactions/listen-to-plot.ts';
import type { PlotInput, Step } from '../interactions/plot-input.ts';
import { type Figure, type FigureSize, saveAsPng, saveAsSvg } from '../save-figure.ts';
import { type PlotTheme, readTheme } from '../theme.ts';
import { makeSurface, type SurfaceSize } from './plot-surface.ts';

/** What every plot is told besides its data. */
export interface SceneBasis {
  /** Changes when the colours of the page do. */
  readonly themeKey: string;
  /** The plot's sentence for screen readers, and the title of a saved figure. */
  readonly label: string;
}

/** One kind of plot: pure functions of its scene (what its owner gives) and its gesture (what is being done to it). */
export interface PlotSpec<Scene extends SceneBasis, Gesture, Intent> {
  readonly idle: Gesture;
  /** What the base canvas depends on; it is painted anew only when one of these changes. */
  baseKey(scene: Scene, gesture: Gesture): readonly unknown[];
  frame(scene: Scene, gesture: Gesture, size: SurfaceSize): Frame;
  drawBase(context: DrawContext, frame: Frame, scene: Scene, gesture: Gesture, theme: PlotTheme): void;
  drawOverlay(context: DrawContext, frame: Frame, scene: Scene, gesture: Gesture, theme: PlotTheme): void;
  step(gesture: Gesture, input: PlotInput, frame: Frame, scene: Scene): Step<Gesture, Intent>;
  /** CSS cursor over a place. */
  pointerStyle(gesture: Gesture, xPx: number, yPx: number, frame: Frame, scene: Scene): string;
}

export interface MountedPlot<Scene, Intent> {
  show(scene: Scene, onIntent: (intent: Intent) => void): void;
  readonly figure: Figure;
  dispose(): void;
}

const PNG_RATIO = 2;

/** Brings a plot to life in an element: surface, input and gesture. The owner shows scenes and hears intents. */
export function mountPlot<Scene extends SceneBasis, Gesture, Intent>(
  host: HTMLElement,
  spec: PlotSpec<Scene, Gesture, Intent>,
): MountedPlot<Scene, Intent> {
  let scene: Scene | undefined;
  let gesture = spec.idle;
  let onIntent: (intent: Intent) => void = () => undefined;
  let theme: PlotTheme | undefined;
  let kept: { readonly key: readonly unknown[]; readonly frame: Frame } | undefined;

  const frameFor = (shown: Scene, size: SurfaceSize): Frame => {
    const key = [size.widthPx, size.heightPx, ...spec.baseKey(shown, gesture)];
    if (!kept || !sameItems(kept.key, key)) kept = { key, frame: spec.frame(shown, gesture, size) };
    return kept.frame;
  };
  const themeNow = (): PlotTheme => {
    theme ??= readTheme(host);
    return theme;
  };
  const surface = makeSurface(host, {
    base: (context, size) => {
      if (scene) spec.drawBase(context, frameFor(scene, size), scene, gesture, themeNow());
    },
    overlay: (context, size) => {
      if (scene) spec.drawOverlay(context, frameFor(scene, size), scene, gesture, themeNow());
    },
    lookChanged: () => {
      theme = undefined;
    },
  });
  const repaint = (before: readonly unknown[] | undefined): void => {
    if (!scene) return;
    const stale = !before || !sameItems(before, spec.baseKey(scene, gesture));
    surface.invalidate(stale ? 'base' : 'overlay');
  };
  const take = (input: PlotInput): boolean => {
    if (!scene) return false;
    const before = spec.baseKey(scene, gesture);
    const frame = frameFor(scene, surface.size());
    const step = spec.step(gesture, input, frame, scene);
    gesture = step.gesture;
    if (input.kind === 'pointer') host.style.cursor = spec.pointerStyle(gesture, input.xPx, input.yPx, frame, scene);
    for (const intent of step.intents) onIntent(intent);
    repaint(before);
    return step.handled;
  };
  const deaf = listenToPlot(host, take);
  const draw = (size: FigureSize) => (context: DrawContext) => {
    if (!scene) return;
    const frame = spec.frame(scene, gesture, size);
    spec.drawBase(context, frame, scene, gesture, themeNow());
    spec.drawOverlay(context, frame, scene, gesture, themeNow());
  };

  return {
    show: (next, hear) => {
      const before = scene && spec.baseKey(scene, gesture);
      if (scene?.themeKey !== next.themeKey) theme = undefined;
      const restyled = scene?.themeKey !== next.themeKey;
      scene = next;
      onIntent = hear;
      repaint(restyled ? undefined : before);
    },
    figure: {
      toSvg: (size = surface.size()) => saveAsSvg(draw(size), size, scene?.label ?? '', themeNow().plot),
      toPng: (size = surface.size()) => saveAsPng(draw(size), size, themeNow().plot, PNG_RATIO),
    },
    dispose: () => {
      deaf();
      surface.dispose();
    },
  };
}

function sameItems(a: readonly unknown[], b: readonly unknown[]): boolean {
  return a.length === b.length && a.every((item, i) => Object.is(item, b[i]));
}
