export type {
  ComplexTable,
  Compartment,
  Constant,
  Network,
  NetworkEvent,
  NetworkRow,
  NetworkUnits,
  Quantity,
  StartQuantity,
  RateLaw,
  Rational,
  ReactionTable,
} from './network.ts';
export * as rational from './rational.ts';
