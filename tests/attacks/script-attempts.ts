/**
 * Attempts to get out of the sandbox or to hold it up. The list grows: whatever is thought of or heard of is added.
 */

/** Scripts that would not end in time by themselves, by what they try. */
export const stalls: Readonly<Record<string, string>> = {
  'endless loop': 'while (true) {}',
  'endless loop that catches': 'for (;;) { try { while (true) {} } catch {} finally {} }',
  'endless loop in finally': 'try { throw 1 } finally { for (;;) {} }',
  'endless generator': 'function* g() { while (true) yield 1 } return [...g()].length',
  'endless iterator protocol':
    'const it = { [Symbol.iterator]: () => ({ next: () => ({ done: false }) }) }; for (const x of it) {}',
  'comparator that never answers': '[3, 2, 1].sort(() => { while (true); })',
  'replacer that never answers': '"aaa".replace(/a/g, () => { for (;;); })',
  'toJSON that never answers': 'return { toJSON() { for (;;); } , get a() { for (;;); } }',
  'getter that never answers': 'return { get a() { while (true); } }',
  'proxy that never answers': 'return new Proxy({}, { ownKeys() { for (;;); } })',
  'valueOf that never answers': 'return 1 + { valueOf() { for (;;); } }',
  'toString that never answers': 'print({ toString() { for (;;); }, get x() { for (;;); } })',
  'error whose message never answers': 'throw { get message() { for (;;); } }',
  'error whose stack never answers':
    'const e = new Error("x"); Object.defineProperty(e, "stack", { get() { for (;;); } }); throw e',
  'spoilt printing': 'print(1); Array.prototype.toJSON = function () { for (;;); }; for (;;);',
  'library callback': 'return math.map([1, 2], () => { for (;;); })',
  'library expression': 'return math.evaluate("f(x) = f(x + 1); 1") && math.evaluate("sum(1:1e9)")',
  'library factorisation of a large matrix': 'return math.det(math.random([2000, 2000]))',
  'regular expression, nested quantifier': 'return /^(a+)+$/.test("a".repeat(60) + "b")',
  'regular expression, alternation': 'return /^(a|aa)+$/.test("a".repeat(90) + "b")',
  'regular expression, back reference': 'return /^(.*)\\1+\\1+\\1+$/.test("ab".repeat(9000) + "c")',
  'array-like of greatest length, includes':
    'return Array.prototype.includes.call({ length: 2 ** 53 - 1 }, 1)',
  'array-like of greatest length, indexOf': 'return Array.prototype.indexOf.call({ length: 2 ** 53 - 1 }, 1)',
  'array-like of greatest length, lastIndexOf':
    'return Array.prototype.lastIndexOf.call({ length: 2 ** 53 - 1 }, 1)',
  'array-like of greatest length, reverse': 'Array.prototype.reverse.call({ length: 2 ** 53 - 1 })',
  'array-like of greatest length, copyWithin':
    'Array.prototype.copyWithin.call({ length: 2 ** 53 - 1 }, 0, 1)',
  'array-like of greatest length, every': 'return [].every.call({ length: 2 ** 53 - 1 }, (x) => 1)',
  'array-like of greatest length, unshift': 'return [].unshift.call({ length: 2 ** 53 - 2 }, 1)',
  'array-like of greatest length, splice': 'return [].splice.call({ length: 2 ** 53 - 1 }, 0, 1)',
  'join of a sparse array': 'return Array(2 ** 31 - 1).join("").length',
  'concatenation of a sparse array': 'const a = []; a.length = 2 ** 32 - 1; return a.concat(a).length',
  'fill of a sparse array': 'return new Array(2 ** 32 - 1).fill(0).length',
  'array from a length without end': 'return Array.from({ length: 2 ** 40 }).length',
  'JSON of a doubling graph':
    'let o = {}; for (let i = 0; i < 40; i++) o = { a: o, b: o }; return JSON.stringify(o).length',
  'returned doubling graph': 'let o = {}; for (let i = 0; i < 40; i++) o = { a: o, b: o }; return o',
  'long search in a string': 'const s = "a".repeat(8e6); return s.indexOf("a".repeat(4e6) + "b")',
  'long search from the end': 'return "a".repeat(4e5).lastIndexOf("a".repeat(2e5) + "b")',
  'allocation that catches its failure':
    'const kept = []; for (;;) { try { kept.push(new Uint8Array(1e6)) } catch {} }',
  'recursion that catches its failure':
    'const f = () => { try { return f() + 1 } catch { return f() } }; return f()',
  'printing without end': 'for (;;) print("x".repeat(1000))',
  'throwing without end': 'for (;;) { try { null.x } catch {} }',
  'proxies in proxies':
    'let p = {}; for (let i = 0; i < 1e5; i++) p = new Proxy(p, {}); for (;;) try { p.x } catch {}',
  'compiling without end': 'for (;;) new Function("return " + Math.random())()',
  'big integers without end': 'let b = 3n ** 100000n; for (;;) b *= b',
  'dates without end': 'for (;;) new Date(8.64e15 - 1).toString()',
  'normalising a long text': 'const s = "\\u1E9B\\u0323".repeat(2e6); for (;;) s.normalize("NFKD")',
  'sorting without end': 'for (;;) Array.from({ length: 1e5 }, (_, i) => (i * 7919) % 100003).sort()',
  'weak references without end':
    'for (;;) { const r = new FinalizationRegistry(() => { for (;;); }); r.register({}, 1) }',
};

/** Scripts that ask for too much; they end by themselves, mostly in words, or by the deadline. */
export const bombs: Readonly<Record<string, string>> = {
  'array of arrays': 'const a = []; for (;;) a.push(new Array(1000).fill(1))',
  'doubling string': 'let s = "x"; for (;;) s += s',
  'string of greatest length': 'return "x".repeat(2 ** 30 - 1).length',
  'typed array of 2 GB': 'return new Float64Array(2 ** 28).length',
  padding: 'return "a".padStart(2 ** 30 - 25).length',
  'replacing by more': 'return "a".repeat(1e6).replaceAll("a", "b".repeat(1000)).length',
  spreading: 'return Math.max(...new Array(1e7))',
  'deep recursion': 'const f = () => f() + 1; return f()',
  'deep nesting of JSON': 'return JSON.parse("[".repeat(1e6))',
  'deep nesting of source': 'return eval("(".repeat(1e5))',
  'deep nesting of a regular expression': 'return new RegExp("(".repeat(1e5) + ")".repeat(1e5)).test("")',
  'text of an array in itself': 'let a = []; for (let i = 0; i < 1e5; i++) a = [a]; return String(a).length',
  'getter of itself': 'const o = { get a() { return this.a } }; return o.a',
  'power of big integers': 'return (2n ** (2n ** 24n)).toString().length',
  'value that holds itself': 'const a = {}; a.a = a; return a',
  'value nested deeply': 'let a = 1; for (let i = 0; i < 1e6; i++) a = [a]; return a',
  'regular expression, lookbehind': 'return /(?<=(a+)+)b/.test("a".repeat(60) + "c")',
  'toJSON of everything': 'Object.prototype.toJSON = function () { for (;;); }; return [1]',
  'value of 100 MB': 'return Array.from({ length: 100 }, () => "x".repeat(1e6))',
};

/** Scripts that look for a way out, with what they must come to: a value, or a failure. */
export const escapes: Readonly<Record<string, readonly [script: string, value: unknown]>> = {
  'names of the host': [
    'return [typeof process, typeof require, typeof module, typeof global, typeof Buffer, typeof fetch, typeof WebAssembly, typeof setTimeout, typeof Worker, typeof Deno, typeof std, typeof os, typeof scriptArgs, typeof performance, typeof console].filter((t) => t !== "undefined")',
    [],
  ],
  'constructor of a constructor': [
    'return ({}).constructor.constructor("return typeof process")()',
    'undefined',
  ],
  'constructor of an asynchronous generator': [
    'const F = (async function* () {}).constructor; return typeof new F("return process")',
    'function',
  ],
  'constructor of print': [
    'return print.constructor("return typeof process + typeof require")()',
    'undefinedundefined',
  ],
  'caller of print': ['try { return String(print.caller) } catch (e) { return "refused" }', 'refused'],
  'constructor of the library': ['return math.evaluate.constructor("return typeof process")()', 'undefined'],
  'functions left by the host': ['return typeof engineHost', 'undefined'],
  'global names': [
    'return Object.getOwnPropertyNames(globalThis).filter((n) => /host|engine|quickjs|module|wasm|ffi/i.test(n))',
    [],
  ],
  'dynamic import': ['let r = "blocked"; import("fs").then(() => (r = "out"), () => 0); return r', 'blocked'],
  'pollution of prototypes': ['Object.prototype.polluted = 1; Array.prototype.map = null; return 1', 1],
  'pollution of the way home': [
    'JSON.stringify = () => "{\\"value\\": \\"forged\\"}"; JSON.parse = null; Reflect.apply = null; return "true"',
    'true',
  ],
  'forged toJSON': ['Object.prototype.toJSON = () => ({ value: "forged" }); return "true"', 'true'],
  'paths in stacks': [
    'try { null.x } catch (e) { return /[/\\\\]|file:|node|emscripten/.test(e.stack) }',
    false,
  ],
  'time, from a date': ['try { return new Date().getTime() } catch { return "no clock" }', 'no clock'],
  'time, from now': ['try { return Date.now() } catch { return "no clock" }', 'no clock'],
  'time, from a call': ['try { return Date() } catch { return "no clock" }', 'no clock'],
  'time, from the class of a given date': [
    'try { return new (new Date(5).constructor)().getTime() } catch { return "no clock" }',
    'no clock',
  ],
  'time, from a subclass': [
    'class D extends Date {} try { return new D().getTime() } catch { return "no clock" }',
    'no clock',
  ],
  'shared memory to time with': ['return typeof Atomics', 'undefined'],
  'place of the machine': ['return new Date(0).getTimezoneOffset()', 0],
  'import by the library': [
    'try { math.import({ a: 1 }); return typeof math.evaluate("import") } catch { return "refused" }',
    'refused',
  ],
  'expression that reaches a constructor': [
    'try { return math.evaluate("cos.constructor(\\"return process\\")()") } catch { return "refused" }',
    'refused',
  ],
  'closing the function and opening another': [
    'return 1 }); globalThis.out = 1; (function () { return typeof process',
    'undefined',
  ],
  'strict functions without this': ['return (function () { return typeof this })()', 'undefined'],
  debugger: ['debugger; return 1', 1],
  'symbols of the host': [
    'return Object.getOwnPropertySymbols(globalThis).map(String).filter((s) => /node|host/i.test(s))',
    [],
  ],
};
