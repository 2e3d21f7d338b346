/** What is used of the statistics package, which has no types of its own. */
declare module 'jstat' {
  const jstat: { chisquare: { cdf(x: number, degrees: number): number } }
  export default jstat
}
