/** 2²⁷ + 1: splits a double into two halves whose products are exact (Dekker 1971). */
const SPLITTER = 134_217_729;

/**
 * start + a'b as if summed in twice the working precision (Ogita, Rump & Oishi 2005, SIAM J. Sci. Comput.
 * 26:1955–1988, algorithm Dot2). Not finite where a number exceeds about 1e300.
 */
export function accurateDot(a: Float64Array, b: Float64Array, start: number): number {
  let sum = start;
  let lost = 0;
  for (let i = 0; i < a.length; i++) {
    const x = a[i]!;
    const y = b[i]!;
    const product = x * y;
    const xWide = SPLITTER * x;
    const xHigh = xWide - (xWide - x);
    const xLow = x - xHigh;
    const yWide = SPLITTER * y;
    const yHigh = yWide - (yWide - y);
    const yLow = y - yHigh;
    const inProduct = xLow * yLow - (product - xHigh * yHigh - xLow * yHigh - xHigh * yLow);
    const total = sum + product;
    const part = total - sum;
    lost += sum - (total - part) + (product - part) + inProduct;
    sum = total;
  }
  return sum + lost;
}
