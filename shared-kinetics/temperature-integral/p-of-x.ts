import { checkX } from './check-x.ts'

/**
 * Scaled temperature integral π(x) = x² eˣ p(x), which lies between 0 and 1 and tends to 1 for large x.
 *
 * p(x) = ∫ₓ^∞ e⁻ᵘ/u² du = E₂(x)/x, x = Ea/(RT). The form e⁻ˣ/x - E₁(x) cancels about log10 x digits and is not used.
 *
 * Evaluated by rational forms N(x)/D(x), one for each of [0.1, 1), [1, 4), [4, 30) and above, whose coefficients were found by interpolating 60-digit values of π at
 * Chebyshev points of ln x. All coefficients are positive, so that nothing cancels: π is a Stieltjes function, and so are its interpolants. From x = 4 the forms are those of
 * 1 - π, whose rounding then hardly shows. Below 0.1 π(x) = x(1 - x eˣ E₁(x)) with the power series of E₁, where next to nothing cancels.
 * Relative error below 1e-15 for 0.001 <= x (against 40-digit values).
 *
 * @param x - positive
 * @throws KineticsError `bad-option` where x is not a positive finite number
 * @source abramowitz-stegun-1964 5.1.11, 5.1.14
 */
export function scaledPOfX(x: number): number {
  checkX(x)
  if (x >= 30) return x > 1e9 ? 1 - 2 / x : highest(x)
  if (x >= 4) return high(x)
  if (x >= 1) return middle(x)
  return x >= 0.1 ? low(x) : x * (1 - x * Math.exp(x) * exponentialIntegral1(x))
}

/** ln p(x); does not overflow or underflow. The slope d ln p/dx is -1/π(x). */
export function lnPOfX(x: number): number {
  return -x - 2 * Math.log(x) + Math.log(scaledPOfX(x))
}

/** p(x). Loses digits above x = 690 and is 0 above about 730, where the value leaves the range of double precision: take `lnPOfX` there. */
export function pOfX(x: number): number {
  return (Math.exp(-x) / x / x) * scaledPOfX(x)
}

const eulerGamma = 0.5772156649015329

/** E₁(x) = -γ - ln x - Σ (-x)ᵏ/(k·k!) for 0 < x < 0.1. */
function exponentialIntegral1(x: number): number {
  let sum = -eulerGamma - Math.log(x)
  let power = 1
  for (let k = 1; k < 40; k++) {
    power *= -x / k
    const term = power / k
    sum -= term
    if (Math.abs(term) < Number.EPSILON * Math.abs(sum)) break
  }
  return sum
}

/** 0.1 <= x < 1; the form errs by less than 8e-17. */
const low = (x: number): number =>
  (((((((((0.9997780097706274 * x + 8.679955848875899) * x + 23.565742722811535) * x + 26.06826263336822) * x + 12.847448082637275) * x +
    2.875498823292305) *
    x +
    0.2816242668465129) *
    x +
    0.010731680634022836) *
    x +
    0.00011551889794126469) *
    x +
    1.3691429400744144e-9) /
  (((((((((x + 10.674626618526867) * x + 38.98884802676328) * x + 63.188833517611535) * x + 49.53303068288051) * x + 19.249123566667365) *
    x +
    3.653340715706777) *
    x +
    0.31954943983495016) *
    x +
    0.01129840666321373) *
    x +
    0.00011614663845665978)

/** 1 <= x < 4; by less than 2e-17. */
const middle = (x: number): number =>
  (((((((0.9999991201091559 * x + 16.549857823941956) * x + 91.59884945499383) * x + 210.23367522431445) * x + 203.35196549944274) * x +
    74.96230804626316) *
    x +
    7.688193643293517) *
    x +
    0.0065888880659498) /
  (((((((x + 18.549805435391285) * x + 122.7000694055948) * x + 368.30034159688785) * x + 529.5476454422319) * x + 353.976640772066) * x +
    97.66877199319958) *
    x +
    8.039908203902558)

/** 4 <= x < 30; by less than 6e-17. */
const high = (x: number): number =>
  1 -
  (((((((4.660248128451109e-12 * x + 1.9999999988158341) * x + 63.33179125607294) * x + 712.8062842953904) * x + 3538.2195346733083) * x +
    7824.59994477654) *
    x +
    6872.757657329297) *
    x +
    1706.4197175658176) /
    (((((((x + 34.665895557021535) * x + 448.4008342032183) * x + 2758.321231002565) * x + 8526.41961252919) * x + 12859.695220272884) * x +
      8400.253772279933) *
      x +
      1716.34734778986)

/** 30 <= x <= 1e9; by less than 1e-17, and less and less above 5000. */
const highest = (x: number): number =>
  1 -
  (((((2.0 * x + 81.95335032103351) * x + 1168.433584346638) * x + 7004.633476908576) * x + 16681.168095535682) * x + 11332.19895007305) /
    ((((((x + 43.976675160516756) * x + 704.1468176548693) * x + 5147.037089492694) * x + 17610.5340140194) * x + 25670.462444059263) * x +
      11675.571841443772)
