export {
  absolute,
  content,
  floorDivide,
  gcd,
  integerForResult,
  lcm,
  primitive,
  primitiveWithPositiveLead,
} from './integers.ts';
export {
  ONE,
  ZERO,
  add,
  compare,
  divide,
  equals,
  formatRational,
  fromDouble,
  isZero,
  multiply,
  negate,
  parseRational,
  power,
  rational,
  rationalForResult,
  sign,
  subtract,
  toDouble,
} from './rational.ts';
export type { Rational } from './rational.ts';
export {
  clearDenominators,
  dot,
  identity,
  integerRows,
  matrixFrom,
  matrixOfRows,
  product,
  rationalMatrix,
  transpose,
} from './matrix.ts';
export type { IntegerMatrix, Matrix, RationalMatrix } from './matrix.ts';
export { determinant, echelon, rankOf } from './echelon.ts';
export type { Echelon } from './echelon.ts';
export { leftNullspace, rightNullspace, solve } from './nullspace.ts';
export { hermiteForm, integerKernel } from './hermite.ts';
export type { HermiteForm } from './hermite.ts';
export { solveLinear } from './linear-programme.ts';
export type { LinearCondition, LinearOutcome, LinearProgramme } from './linear-programme.ts';
export { AnnihilationCheck } from './annihilates.ts';
export { certifiedRank, leftKernel, modularRanks } from './left-kernel.ts';
export type { LeftKernel } from './left-kernel.ts';
export { rowIndex } from './sparse.ts';
export type { RowIndex, SparseColumns, SparseVector } from './sparse.ts';
export { independentSelection } from './independent.ts';
