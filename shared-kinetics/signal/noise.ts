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
  let count = 0
  for (let i = first + 2 * stride; i <= last - 2 * stride; i += every) {
    const at = x[i] ?? Number.NaN
    let estimate = 0
    let squares = 1
    for (let k = -2; k <= 2; k++) {
      if (k === 0) continue
      let weight = 1
      for (let m = -2; m <= 2; m++) {
        if (m === 0 || m === k) continue
        const other = x[i + m * stride] ?? Number.NaN
        weight *= (at - other) / ((x[i + k * stride] ?? Number.NaN) - other)
      }
      estimate += weight * (y[i + k * stride] ?? Number.NaN)
      squares += weight * weight
    }
    scaled[count++] = Math.abs((y[i] ?? Number.NaN) - estimate) / Math.sqrt(squares)
  }
  return madToStandardDeviation * median(scaled)
}

/** The same over strides 1, 2, 4, … up to `widestStride`, the largest of them: noise that is correlated from sample to sample is not missed. */
export function correlatedNoiseOf(x: Float64Array, y: Float64Array, first: number, last: number, widestStride: number): number {
  let noise = noiseOf(x, y, first, last)
  for (let stride = 2; stride <= widestStride && last - first > 8 * stride; stride *= 2) {
    noise = Math.max(noise, noiseOf(x, y, first, last, stride))
  }
  return noise
}
