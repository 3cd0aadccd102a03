/** What the tests use of the package, whose own declarations its export map hides. Functions answer once `compiled` has settled. */
declare module 'cephes' {
  export const compiled: Promise<void>
  /** The t below which a share `p` of Student's t distribution with `k` degrees of freedom lies. */
  export function stdtri(k: number, p: number): number
  /** Generalised exponential integral E_n(x). */
  export function expn(n: number, x: number): number
}
