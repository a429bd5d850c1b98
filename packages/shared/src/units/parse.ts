import { Scanner } from '../notation/tokens.ts';
import { findSymbol } from './table.ts';
import { unitOf } from './unit.ts';
import type { Unit, UnitFactor } from './unit.ts';

/** No unit that is in use has more. */
export const FACTOR_LIMIT = 12;
/** Beyond this a power is a slip of the key, and its scale would be a monster. */
export const POWER_LIMIT = 20;

/**
 * Reads as much of a unit as stands at the scanner: factors side by side or after `/`, each with an optional integer
 * power; a leading `1` before `/` is passed over. Leaves the scanner where the unit ends; an empty unit where none begins.
 */
export function readUnit(scanner: Scanner): Unit {
  // Most words that might begin a unit begin none.
  if (scanner.kind !== 'name' && !scanner.is('/') && scanner.word !== '1') return noUnit;
  const factors: UnitFactor[] = [];
  const start = scanner.mark();
  const before = scanner.previousEnd;
  if (scanner.kind === 'number' && scanner.word === '1') {
    scanner.advance();
    if (!scanner.is('/')) {
      scanner.reset(start, before);
      return [];
    }
  }
  while (factors.length < FACTOR_LIMIT) {
    const factor = readFactor(scanner);
    if (!factor) break;
    factors.push(factor);
  }
  if (factors.length === 0) {
    scanner.reset(start, before);
    return noUnit;
  }
  return sameUnit(unitOf(factors));
}

const noUnit: Unit = [];

/** The units read last: a text has few, and as one object each is converted once. */
const recent: Unit[] = [];
const RECENT_LIMIT = 16;

function sameUnit(unit: Unit): Unit {
  for (const known of recent) if (equalFactors(known, unit)) return known;
  if (recent.length === RECENT_LIMIT) recent.shift();
  recent.push(unit);
  return unit;
}

function equalFactors(a: Unit, b: Unit): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i += 1)
    if (a[i]?.symbol !== b[i]?.symbol || a[i]?.power !== b[i]?.power) return false;
  return true;
}

function readFactor(scanner: Scanner): UnitFactor | null {
  const start = scanner.mark();
  const before = scanner.previousEnd;
  const below = scanner.take('/');
  const symbol = scanner.kind === 'name' ? findSymbol(scanner.word) : null;
  if (symbol) {
    scanner.advance();
    // `min(` is the function, `m[` an indexed name.
    const power = scanner.is('(') || scanner.is('[') ? null : readPower(scanner);
    if (power !== null) return { symbol: symbol.symbol, power: below ? -power : power };
  }
  scanner.reset(start, before);
  return null;
}

/** The power after `^`, 1 where there is none, null where what follows `^` is no integer that a unit may have. */
function readPower(scanner: Scanner): number | null {
  if (!scanner.take('^')) return 1;
  const negative = scanner.take('-');
  if (scanner.kind !== 'number' || !/^\d+$/.test(scanner.word)) return null;
  const power = Number(scanner.word);
  if (power === 0 || power > POWER_LIMIT) return null;
  scanner.advance();
  return negative ? -power : power;
}

/** The unit that a whole text states, such as "/uM/s" or "uM^-1 s^-1"; null where it states none. */
export function parseUnit(text: string): Unit | null {
  const scanner = new Scanner(text, 0, text.length, 'expression');
  const unit = readUnit(scanner);
  return unit.length > 0 && scanner.kind === 'end' ? unit : null;
}
