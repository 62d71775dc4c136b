/** Pixels across a picture: 300 to the inch over the width of a printed page. */
const WIDTH_PX = 2400;

/** A picture of SVG text as PNG on white; null where the browser cannot draw it. */
export async function pngOf(svg: string): Promise<Blob | null> {
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  try {
    await image.decode();
  } catch {
    return null;
  }
  const canvas = document.createElement('canvas');
  canvas.width = WIDTH_PX;
  canvas.height = Math.round((WIDTH_PX * image.naturalHeight) / image.naturalWidth);
  const brush = canvas.getContext('2d');
  if (!brush || !(canvas.height > 0)) return null;
  brush.fillStyle = '#ffffff';
  brush.fillRect(0, 0, canvas.width, canvas.height);
  brush.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve) => canvas.toBlob(resolve, 'image/png'));
}
