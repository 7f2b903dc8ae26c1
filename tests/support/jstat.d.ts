/** The little of jstat that the checks of our own distributions use. */
declare module 'jstat' {
  interface Normal { cdf: (x: number, mean: number, deviation: number) => number, inv: (p: number, mean: number, deviation: number) => number }
  interface StudentT { cdf: (x: number, degrees: number) => number, inv: (p: number, degrees: number) => number }
  export const jStat: { normal: Normal, studentt: StudentT }
  const exported: { jStat: typeof jStat }
  export default exported
}
