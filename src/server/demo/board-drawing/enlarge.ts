/** Small maps brought to the size of the picture. */

export type Map8 = { pixels: Uint8Array; width: number; height: number };

/** The map at another size, linear between its pixels; `channels` bytes a pixel. */
export function enlarged(
  { pixels, width, height }: Map8,
  wide: number,
  high: number,
  channels = 1,
): Uint8Array {
  const out = new Uint8Array(wide * high * channels);
  const row = new Float32Array(width * channels);
  const left = new Int32Array(wide);
  const share = new Float32Array(wide);
  for (let x = 0; x < wide; x++) {
    const at = Math.max(0, Math.min(width - 1.001, ((x + 0.5) * width) / wide - 0.5));
    left[x] = Math.floor(at) * channels;
    share[x] = at - Math.floor(at);
  }
  for (let y = 0, i = 0; y < high; y++) {
    const at = Math.max(0, Math.min(height - 1.001, ((y + 0.5) * height) / high - 0.5));
    const above = Math.floor(at) * row.length;
    const k = at - Math.floor(at);
    for (let j = 0; j < row.length; j++) {
      const p = pixels[above + j] ?? 0;
      row[j] = p + ((pixels[above + row.length + j] ?? 0) - p) * k;
    }
    for (let x = 0; x < wide; x++) {
      const from = left[x] ?? 0;
      const t = share[x] ?? 0;
      for (let c = 0; c < channels; c++) {
        const p = row[from + c] ?? 0;
        out[i++] = p + ((row[from + channels + c] ?? 0) - p) * t + 0.5;
      }
    }
  }
  return out;
}
