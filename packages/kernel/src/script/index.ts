export { loadScriptEngine, type MendableScriptEngine } from './quickjs-engine.ts';
export type { ScriptEngine, ScriptRun } from './script-engine.ts';
export { type GuestSource, makeSnapshot } from './snapshot.ts';
