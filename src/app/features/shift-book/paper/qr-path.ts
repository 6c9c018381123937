/** A QR code's modules, row by row. */
export interface QrModules {
  readonly size: number;
  readonly data: ArrayLike<number | boolean>;
}

/** The dark modules as one SVG path on a grid of `size` × `size`, a run of neighbours at a time. */
export function qrPath({ size, data }: QrModules): string {
  const runs: string[] = [];
  for (let y = 0; y < size; y++)
    for (let x = 0; x < size; x++) {
      if (!data[y * size + x]) continue;
      let end = x + 1;
      while (end < size && data[y * size + end]) end++;
      runs.push(`M${x} ${y}h${end - x}v1h${x - end}z`);
      x = end;
    }
  return runs.join('');
}
