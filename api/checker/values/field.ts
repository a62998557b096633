/** How the functions are meant, and how finely they are computed. */
export interface Field {
  readonly bits: number;
  /** Principal branches where a real function has no value. */
  readonly complex: boolean;
}
