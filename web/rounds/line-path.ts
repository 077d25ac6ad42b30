/** An SVG path through values spread evenly over a width, from 0 at the bottom to `top`; it breaks where values are missing. */
export function linePath(values: readonly (number | null)[], width: number, height: number, top: number): string {
  const step = values.length > 1 ? width / (values.length - 1) : 0;
  let pen = false;
  let path = '';
  values.forEach((value, i) => {
    if (value === null || !(top > 0)) {
      pen = false;
      return;
    }
    const y = height - 1 - (Math.max(0, value) / top) * (height - 2);
    path += `${pen ? 'L' : 'M'}${(i * step).toFixed(1)} ${y.toFixed(1)}`;
    pen = true;
  });
  return path;
}
