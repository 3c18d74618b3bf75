/** A tail probability P in logarithms, and its derivatives over P, against the noncentrality and against t. */
export interface NoncentralTail {
  readonly logTail: number;
  readonly byNoncentrality: number;
  readonly twiceByNoncentrality: number;
  readonly byT: number;
  readonly twiceByT: number;
}
