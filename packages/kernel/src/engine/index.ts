export { type EngineControl, StopRequested } from './control.ts';
export { evaluateCell } from './evaluate-cell.ts';
export { CellFailure } from './failure.ts';
