/**
 * Size of a vector at each reading.
 *
 * @param every - only each such reading; default all. A median needs no more than some thousands.
 */
export function vectorSize(x: Float64Array, y: Float64Array, z: Float64Array, every = 1): Float64Array {
  const out = new Float64Array(Math.ceil(x.length / every));
  for (let i = 0, o = 0; i < x.length; i += every, o++)
    out[o] = Math.sqrt(x[i]! * x[i]! + y[i]! * y[i]! + z[i]! * z[i]!);
  return out;
}
