import type { DrawContext, PixelBlock } from './draw-context.ts';

/** A canvas context that can also paint pixel blocks under its transform and clip, which putImageData ignores. */
export function canvasContext(context: CanvasRenderingContext2D): DrawContext {
  const stage = document.createElement('canvas');
  const drawPixels = (block: PixelBlock, xPx: number, yPx: number): void => {
    const staged = stageBlock(stage, block);
    if (!staged) return;
    context.imageSmoothingEnabled = false;
    context.drawImage(stage, 0, 0, block.width, block.height, xPx, yPx, block.width, block.height);
  };
  return Object.assign(context, { drawPixels });
}

function stageBlock(stage: HTMLCanvasElement, block: PixelBlock): boolean {
  if (block.width < 1 || block.height < 1) return false;
  if (stage.width !== block.width) stage.width = block.width;
  if (stage.height !== block.height) stage.height = block.height;
  const context = stage.getContext('2d');
  context?.putImageData(new ImageData(block.rgba, block.width, block.height), 0, 0);
  return context !== null;
}
