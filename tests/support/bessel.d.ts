declare module 'bessel' {
  /** Bessel function of the first kind of a real argument and whole order. */
  export const besselj: (x: number, order: number) => number
}
