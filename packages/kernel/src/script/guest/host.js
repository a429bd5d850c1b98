// Runs in the sandbox after the maths library, before the snapshot is taken. Leaves three functions for the host, which
// takes hold of them before any script runs: run(text, names, values, seed), printed(), and nothing else.
(() => {
  const { parse, stringify } = JSON;
  const { isArray } = Array;
  const { math, Function: MakeFunction, String: toText, Promise: Later } = globalThis;
  const keysOf = Object.keys;
  const hasOwn = Object.prototype.hasOwnProperty;
  const { apply, deleteProperty } = Reflect;

  /** Most lines that are kept, longest line and longest value, in UTF-16 units; deepest nesting of a value. */
  const mostLines = 2000;
  const longestLine = 20000;
  const longestOutput = 400000;
  const deepest = 60;

  let lines = [];
  let output = 0;
  let dropped = 0;
  let notes = [];

  const note = (words) => {
    if (notes.indexOf(words) === -1) notes[notes.length] = words;
  };

  /** A value as JSON has it. What JSON has not becomes text or null, and a note says so. */
  const plain = (value, depth) => {
    if (value === null || value === undefined) return null;
    switch (typeof value) {
      case 'number':
        if (value - value === 0) return value;
        note('NaN and infinite numbers are given as null.');
        return null;
      case 'boolean':
      case 'string':
        return value;
      case 'bigint':
        return toText(value);
      case 'function':
      case 'symbol':
        note('Functions and symbols are given as null.');
        return null;
    }
    if (depth > deepest)
      throw new Error('The value is nested more than ' + deepest + ' deep, or holds itself.');
    if (value instanceof Later) throw new Error('A script gives its value at once, not as a promise.');
    if (math.isMatrix(value) || math.isResultSet(value)) return plain(value.valueOf(), depth + 1);
    if (math.isBigNumber(value) || math.isComplex(value) || math.isUnit(value)) return math.format(value);
    if (math.isFraction(value)) return value.toFraction();
    if (value instanceof Date) return value.toISOString();
    if (value instanceof Map) return plain([...value], depth + 1);
    if (value instanceof Set || ArrayBuffer.isView(value)) return plain([...value], depth + 1);
    if (isArray(value)) {
      const list = [];
      for (let index = 0; index < value.length; index++) list[index] = plain(value[index], depth + 1);
      return list;
    }
    const record = {};
    for (const key of keysOf(value)) {
      const inner = value[key];
      if (inner !== undefined)
        Object.defineProperty(record, key, { value: plain(inner, depth + 1), enumerable: true });
    }
    return record;
  };

  const lineOf = (value) => {
    if (typeof value === 'string') return value;
    if (value === undefined) return 'undefined';
    if (typeof value === 'number') return toText(value);
    if (typeof value === 'function') return 'function ' + value.name;
    const text = plain(value, 0);
    return typeof text === 'string' ? text : stringify(text);
  };

  const print = (...values) => {
    let line = '';
    for (let index = 0; index < values.length; index++)
      line += (index === 0 ? '' : ' ') + lineOf(values[index]);
    if (line.length > longestLine) line = line.slice(0, longestLine) + ' …';
    if (lines.length >= mostLines || output + line.length > longestOutput) {
      dropped++;
      return;
    }
    output += line.length;
    lines[lines.length] = line;
  };

  const printed = () =>
    stringify(dropped === 0 ? lines : [...lines, '… and ' + dropped + ' more lines that are not kept']);

  /** sfc32 (Doty-Humphrey, PractRand), seeded with 128 bits; 53 bits a number, in [0, 1). */
  const randomFrom = (seed) => {
    const word = (place) => parseInt(seed.slice(8 * place, 8 * place + 8), 16) | 0;
    let a = word(0);
    let b = word(1);
    let c = word(2);
    let counter = word(3);
    const next = () => {
      const mixed = (((a + b) | 0) + counter) | 0;
      counter = (counter + 1) | 0;
      a = b ^ (b >>> 9);
      b = (c + (c << 3)) | 0;
      c = (c << 21) | (c >>> 11);
      c = (c + mixed) | 0;
      return mixed >>> 0;
    };
    for (let round = 0; round < 15; round++) next();
    return () => ((next() >>> 5) * 67108864 + (next() >>> 6)) / 9007199254740992;
  };

  /** Lines that the function's own head takes before the first line of the text. */
  const headLines = 3;
  const ownFrame = /<input>:(\d+):(\d+)/;

  /** What was thrown, as the host reads it; the place is that in the script's text. */
  const thrown = (error) => {
    const known = typeof error === 'object' && error !== null && 'message' in error;
    const message = known ? toText(error.message) : 'The script threw ' + lineOf(error) + '.';
    const name = known && typeof error.name === 'string' ? error.name : '';
    const frame = known ? ownFrame.exec(toText(error.stack)) : null;
    const place = frame === null ? {} : { line: frame[1] - headLines, column: +frame[2] };
    return { name, message, ...place };
  };

  /** What a script taught its own values to say of themselves must not speak for the whole. */
  const forgeable = [Object, Array, String, Number, Boolean, MakeFunction].map(({ prototype }) => prototype);
  const unforge = () => {
    for (let index = 0; index < forgeable.length; index++) deleteProperty(forgeable[index], 'toJSON');
  };

  const clockless = () => {
    const Timed = globalThis.Date;
    const noClock = () => {
      throw new Error(
        'A script has no clock: the same text must give the same value. Give new Date() a time.',
      );
    };
    const Dated = function (...given) {
      if (given.length === 0 || new.target === undefined) noClock();
      return Reflect.construct(Timed, given, new.target);
    };
    Dated.prototype = Timed.prototype;
    Dated.prototype.constructor = Dated;
    Dated.now = noClock;
    Dated.parse = Timed.parse;
    Dated.UTC = Timed.UTC;
    globalThis.Date = Dated;
  };
  clockless();

  const run = (text, names, values, seed) => {
    delete globalThis.engineHost;
    const random = randomFrom(seed);
    Math.random = random;
    if (/random|pick/i.test(text)) math.config({ randomSeed: seed });
    Object.assign(globalThis, { print, random, math });
    let value;
    try {
      const given = parse(values);
      const body = MakeFunction(...parse(names), '"use strict";\n' + text);
      value = apply(body, undefined, given);
      value = plain(value, 0);
      unforge();
      const all = stringify({ value, notes });
      if (all.length > 20 * longestOutput) throw new Error('The value is too large to be kept.');
      return all;
    } catch (error) {
      const words = thrown(error);
      unforge();
      return stringify({ thrown: words });
    }
  };

  // The first use of the library's reader makes most of its functions; better here than in each script.
  math.evaluate('det([[1, 2], [3, 4]]) + 2 cm / cm');
  math.mean(1, 2);
  globalThis.engineHost = { run, printed, hasOwn };
})();
