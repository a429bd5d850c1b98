export { type EngineCommand, engineCommand, workerFile } from './host/command.ts';
export { endedOutcome } from './host/endings.ts';
export { EngineProcess, type EngineRunOptions } from './host/engine-process.ts';
export { findIsolation, type Isolation, type IsolationOptions } from './host/isolation.ts';
