export { closeCodes } from './close-codes.ts';
export type { CloseCode } from './close-codes.ts';
export { limits } from './limits.ts';
export { messageTypes } from './messages.ts';
export type {
  CellError,
  CellNotice,
  CellState,
  Notice,
  NoticeTopic,
  PlanNotice,
  Presence,
} from './messages.ts';
export { stopPipe, stopReasons } from './engine-messages.ts';
export type { EngineReport, EngineRequest, StopReason } from './engine-messages.ts';
