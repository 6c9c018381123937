/** What this project uses of jstat 1.9.6, which ships no types. */
declare module 'jstat' {
  interface ChiSquare {
    /** P(X ≤ x) with `degrees` > 0. */
    cdf(x: number, degrees: number): number;
    /** The x with P(X ≤ x) = p. */
    inv(p: number, degrees: number): number;
  }
  const jstat: { readonly chisquare: ChiSquare };
  export default jstat;
}
