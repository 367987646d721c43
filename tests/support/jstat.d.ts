/** The parts we use of a statistics library that comes without types. */
declare module 'jstat' {
  interface Distribution {
    cdf(x: number, ...parameters: number[]): number
    inv(p: number, ...parameters: number[]): number
    pdf(x: number, ...parameters: number[]): number
  }
  const library: {
    jStat: {
      normal: Distribution
      studentt: Distribution
      chisquare: Distribution
      binomial: Distribution
      ibeta(x: number, a: number, b: number): number
      gammaln(x: number): number
      tci(value: number, alpha: number, sample: number[]): [number, number]
      models: { ols(y: number[], x: number[][]): { coef: number[]; t: { se: number[] } } }
    }
  }
  export default library
}
