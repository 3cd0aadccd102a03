/** What the tests use of the package, whose own declarations its export map hides. Functions answer once `compiled` has settled. */
declare module 'cephes' {
  export const compiled: Promise<void>
  /** The t below which a share `p` of Student's t distribution with `k` degrees of freedom lies. */
  export function stdtri(k: number, p: number): number
  /** Generalised exponential integral E_n(x). */
  export function expn(n: number, x: number): number
  /** Share of the F distribution below x, above x, and the x above which a share p lies. */
  export function fdtr(dof1: number, dof2: number, x: number): number
  export function fdtrc(dof1: number, dof2: number, x: number): number
  export function fdtri(dof1: number, dof2: number, p: number): number
  /** Share of the standard normal distribution below x, and its inverse. */
  export function ndtr(x: number): number
  export function ndtri(p: number): number
}
