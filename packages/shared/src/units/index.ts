export { avogadro, commonSymbols, dimensionNames, findSymbol } from './table.ts';
export type { Dimension, DimensionName, UnitSymbol } from './table.ts';
export {
  conversionFactor,
  dimensionOf,
  printUnit,
  sameDimension,
  scaleOf,
  unitOf,
  unitPower,
  unitProduct,
} from './unit.ts';
export type { Unit, UnitFactor } from './unit.ts';
export { parseUnit } from './parse.ts';
