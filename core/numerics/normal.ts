/** 1/sqrt(2 pi), the density at the middle. */
const peakDensity = 0.3989422804014327;

/* Rational fits p(x)/q(x), lowest power first, made in 60 digits by weighted least squares (own computation);
 * largest relative error 1.5e-17. All coefficients are positive, so no digit is lost by cancellation. */
const centralTop = [
  0.39894228040143265, 0.024277052507248542, 0.0035762892675015438, 5.5032885347998565e-5, 1.4316283138417795e-6,
];
const centralBottom = [1, 0.22752021290603477, 0.021884463280586765, 0.0010735426860207999, 2.319240184534568e-5];
const nearTop = [
  1.2533141373163168, 1.2688796379527973, 0.6470983959658019, 0.1972721882090274, 0.0374042478219451,
  0.004155394831151103, 0.00021228495067383526,
];
const nearBottom = [
  1, 1.8103040334536422, 1.4607234580259336, 0.6836986319711599, 0.20146633700508268, 0.03761362411934398,
  0.004155538377422198, 0.00021228144342327215,
];
const middleTop = [
  1.253315053229393, 1.5104488047725253, 0.8911320917131564, 0.3182927813110667, 0.0722413775585741,
  0.009976360016611025, 0.0006871954225292617,
];
const middleBottom = [
  1, 2.00305263736948, 1.8092129669215078, 0.9619623827586569, 0.32827151840762236, 0.07292846418057482,
  0.009976363158559803, 0.0006871953794569742,
];
const farTop = [1, 44.127814159451916, 621.2637953910101, 3230.94848371695, 5272.804894647109, 1216.847617159834];
const farBottom = [1, 45.12781415945188, 663.3916095505348, 3773.956650738397, 7628.503947494292, 3680.931283367582];
/* Starting values of the quantile: z against sqrt(-2 ln tail), relative error 5e-7, tail from 1e-320 to 0.32. */
const startTop = [-2.927259211057903, -3.4655818608734896, 2.7832361693864445, 1.7767540479157684, 0.12980970210831716];
const startBottom = [1, 3.394927302367727, 1.7796007302163748, 0.12979374154218354];

/** Inside this distance from the middle the share on one side is counted from the middle. */
const central = 0.4;

function ratio(top: readonly number[], bottom: readonly number[], x: number): number {
  let p = 0;
  let q = 0;
  for (let i = top.length - 1; i >= 0; i--) p = p * x + (top[i] ?? 0);
  for (let i = bottom.length - 1; i >= 0; i--) q = q * x + (bottom[i] ?? 0);
  return p / q;
}

/** Upper tail over density (Mills' ratio), for z from 0.4 up; relative error 3e-16. */
export function millsRatio(z: number): number {
  if (z < 2.5) return ratio(nearTop, nearBottom, z);
  if (z < 6) return ratio(middleTop, middleBottom, z);
  return ratio(farTop, farBottom, 1 / (z * z)) / z;
}

/** exp(-z^2/2); the square is taken of a rounded z, so that its rounding error is not magnified. */
function gauss(z: number): number {
  const coarse = Math.round(z * 64) / 64;
  return Math.exp(-0.5 * coarse * coarse) * Math.exp(-0.5 * (z - coarse) * (z + coarse));
}

/** Density of the standard normal distribution at any real z. */
export function normalDensity(z: number): number {
  return Math.abs(z) < 40 ? peakDensity * gauss(z) : Number.isNaN(z) ? NaN : 0;
}

/**
 * Share of the standard normal distribution between 0 and z (negative for negative z); relative error 3e-16.
 *
 * @param z any real number
 * @returns a number in [-1/2, 1/2]
 */
export function normalFromMiddle(z: number): number {
  if (Math.abs(z) < 1) return z * ratio(centralTop, centralBottom, z * z);
  return z > 0 ? 0.5 - normalTail(z) : normalTail(-z) - 0.5;
}

/**
 * Upper tail of the standard normal distribution, P(Z > z); relative error below 1e-15 down to 1e-307.
 *
 * @param z any real number, infinities included
 * @returns a probability in [0, 1]; 0 only where the tail is below the smallest double (z > 38.5)
 */
export function normalTail(z: number): number {
  if (z < 0) return 1 - normalTail(-z);
  if (z < central) return 0.5 - z * ratio(centralTop, centralBottom, z * z);
  return z < 40 ? peakDensity * gauss(z) * millsRatio(z) : Number.isNaN(z) ? NaN : 0;
}

/**
 * ln P(Z <= z), without underflow for any finite z whose square is finite.
 *
 * @param z any real number
 * @returns a number <= 0
 */
export function logNormalCdf(z: number): number {
  if (z > -central) return Math.log1p(-normalTail(z));
  return -0.5 * z * z + Math.log(peakDensity * millsRatio(-z));
}

/** Quantile near the middle from its signed distance in probability, |distance| < 0.19. */
function quantileFromMiddle(distance: number): number {
  const s = distance * distance;
  let z = distance * ratio([2.506628286, -8.446661999, 3.598403364], [1, -4.416924972, 3.757681435], s);
  const newton = (normalFromMiddle(z) - distance) / normalDensity(z);
  z -= newton / (1 + 0.5 * z * newton);
  return z;
}

/**
 * The z with P(Z > z) = tail, with full double precision over all positive doubles.
 *
 * @param tail probability above 0, below 1; the complement of a confidence level
 * @returns any real number; negative when tail > 1/2; NaN when tail is outside its range
 * @source starting value by an own rational fit, then one step of Halley's method on ln(tail)
 */
export function normalQuantileOfTail(tail: number): number {
  if (!(tail > 0 && tail < 1)) return NaN;
  const distance = 0.5 - tail;
  if (Math.abs(distance) < 0.17) return quantileFromMiddle(distance);
  if (distance < 0) return -normalQuantileOfTail(1 - tail);
  return normalQuantileOfLogTail(Math.log(tail));
}

/**
 * The z with ln P(Z > z) = logTail, for tails a double cannot hold; relative error 1e-15.
 *
 * @param logTail below -1.1 (a tail below 1/3)
 * @source as normalQuantileOfTail
 */
export function normalQuantileOfLogTail(logTail: number): number {
  const z = ratio(startTop, startBottom, Math.sqrt(-2 * logTail));
  const mills = millsRatio(z);
  const excess = -0.5 * z * z + Math.log(peakDensity * mills) - logTail;
  const step = excess * mills;
  return z + step / (1 + 0.5 * step * (1 / mills - z));
}
