import { median } from './median.ts'

/** Standard deviation of a normal variable over the median of its magnitude: 1/Φ⁻¹(3/4). */
const madToStandardDeviation = 1.482602218505602

/** Of so many samples the median's own standard error is below 2 %: more tell nothing that matters. */
const mostSamples = 5_000

/**
 * Standard deviation of the noise of y(x), robust against spikes, steps and the shape of the curve itself.
 *
 * At each sample the value is compared with the cubic through the four samples at one and two strides on either side; the difference, over its own standard
 * deviation for independent noise, has the noise's spread. The median of the magnitudes takes no notice of a few wild ones. Of more than 5,000 samples so many, evenly spread, are looked at.
 *
 * @param stride - in samples. Noise that a filter has spread over neighbouring samples shows only at a stride as wide as the filter.
 * @returns NaN with fewer than five usable samples
 * @source gasser-1986 (with a cubic in place of a straight line, so that a curved signal counts as smooth)
 */
export function noiseOf(x: Float64Array, y: Float64Array, first: number, last: number, stride = 1): number {
  const every = Math.max(1, Math.ceil((last - first + 1) / mostSamples))
  const scaled = new Float64Array(Math.max(0, Math.ceil((last - first + 1 - 4 * stride) / every)))
  const count = differences(x, y, first + 2 * stride, last - 2 * stride, every, stride, scaled)
  return madToStandardDeviation * median(scaled.subarray(0, count))
}

/** Distance of each sample looked at from the cubic through its four neighbours, over its standard deviation for noise of 1; how many there are. */
function differences(
  x: Float64Array,
  y: Float64Array,
  from: number,
  to: number,
  every: number,
  stride: number,
  scaled: Float64Array,
): number {
  let count = 0
  for (let i = from; i <= to; i += every) {
    const at = x[i] as number
    const a = (x[i - 2 * stride] as number) - at
    const b = (x[i - stride] as number) - at
    const c = (x[i + stride] as number) - at
    const d = (x[i + 2 * stride] as number) - at
    // Lagrange's weights of the four samples at the place of the fifth.
    const wa = (b * c * d) / ((b - a) * (c - a) * (d - a))
    const wb = (a * c * d) / ((a - b) * (c - b) * (d - b))
    const wc = (a * b * d) / ((a - c) * (b - c) * (d - c))
    const wd = (a * b * c) / ((a - d) * (b - d) * (c - d))
    const estimate =
      wa * (y[i - 2 * stride] as number) +
      wb * (y[i - stride] as number) +
      wc * (y[i + stride] as number) +
      wd * (y[i + 2 * stride] as number)
    scaled[count++] = Math.abs((y[i] as number) - estimate) / Math.sqrt(1 + wa * wa + wb * wb + wc * wc + wd * wd)
  }
  return count
}

/** The same over strides 1, 2, 4, … up to `widestStride`, the largest of them: noise that is correlated from sample to sample is not missed. */
export function correlatedNoiseOf(x: Float64Array, y: Float64Array, first: number, last: number, widestStride: number): number {
  let noise = noiseOf(x, y, first, last)
  for (let stride = 2; stride <= widestStride && last - first > 8 * stride; stride *= 2) {
    noise = Math.max(noise, noiseOf(x, y, first, last, stride))
  }
  return noise
}
