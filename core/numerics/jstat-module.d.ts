/** What is used of jstat, which ships no types. */
declare module 'jstat' {
  interface Distributions {
    readonly beta: { cdf(x: number, alpha: number, beta: number): number };
    readonly studentt: { cdf(t: number, freedom: number): number };
    lowRegGamma(shape: number, x: number): number;
  }
  const jstat: { readonly jStat: Distributions };
  export default jstat;
}
