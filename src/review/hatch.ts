const TILE_PX = 7;

/** A repeating pattern of thin diagonal lines for what is left out, made anew only where colour or pixel ratio change. */
export class Hatch {
  private pattern: CanvasPattern | null = null;
  private madeFor = '';

  /** `scaled` says that the brush draws in CSS pixels already; otherwise it draws in canvas pixels. */
  for(
    brush: CanvasRenderingContext2D,
    colour: string,
    ratio: number,
    scaled: boolean,
  ): CanvasPattern | null {
    const wanted = `${colour} ${ratio} ${scaled}`;
    if (wanted === this.madeFor) return this.pattern;
    this.madeFor = wanted;
    this.pattern = makeHatch(brush, colour, ratio);
    if (scaled) this.pattern?.setTransform(new DOMMatrix().scale(1 / ratio));
    return this.pattern;
  }
}

function makeHatch(
  brush: CanvasRenderingContext2D,
  colour: string,
  ratio: number,
): CanvasPattern | null {
  const size = Math.max(4, Math.round(TILE_PX * ratio));
  const tile = document.createElement('canvas');
  tile.width = size;
  tile.height = size;
  const pen = tile.getContext('2d');
  if (!pen) return null;
  pen.strokeStyle = colour;
  pen.lineWidth = ratio;
  pen.beginPath();
  for (const shift of [-size, 0, size]) {
    pen.moveTo(shift - ratio, size + ratio);
    pen.lineTo(shift + size + ratio, -ratio);
  }
  pen.stroke();
  return brush.createPattern(tile, 'repeat');
}
