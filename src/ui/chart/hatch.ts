const STEP = 4;

/**
 * A diagonal hatch in one colour: what is projected is drawn with the full colour on part of the area, so that it is lighter to the eye and still
 * stands out from the paper. The pattern hangs on the canvas, so that neighbouring bars hatch as one field.
 */
export function hatch(context: CanvasRenderingContext2D, color: string, background: string): CanvasPattern | string {
  const tile = document.createElement('canvas');
  tile.width = STEP * 2;
  tile.height = STEP * 2;
  const draw = tile.getContext('2d');
  if (!draw) return color;
  draw.scale(2, 2);
  draw.fillStyle = background;
  draw.fillRect(0, 0, STEP, STEP);
  draw.strokeStyle = color;
  draw.lineWidth = 1.5;
  draw.beginPath();
  // Three strokes, so that the corners of the tile meet without a gap.
  for (const shift of [-STEP, 0, STEP]) {
    draw.moveTo(shift - 1, STEP + 1);
    draw.lineTo(shift + STEP + 1, -1);
  }
  draw.stroke();
  const pattern = context.createPattern(tile, 'repeat');
  pattern?.setTransform(new DOMMatrix().scale(0.5, 0.5));
  return pattern ?? color;
}
