/** The little of jstat that tests compare with; the package ships no types. */
declare module "jstat" {
  const jstat: {
    studentt: { cdf: (t: number, df: number) => number };
    beta: { cdf: (x: number, a: number, b: number) => number };
    centralF: { cdf: (f: number, numeratorDf: number, denominatorDf: number) => number };
  };
  export default jstat;
}
