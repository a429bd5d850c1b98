/** Instruction bytes of the WebAssembly core specification (release 1.0, section 5.4) that the engine's programs use. */
export const instruction = {
  block: 0x02,
  loop: 0x03,
  end: 0x0b,
  branch: 0x0c,
  branchIf: 0x0d,
  call: 0x10,
  select: 0x1b,
  localGet: 0x20,
  localSet: 0x21,
  localTee: 0x22,
  f64Load: 0x2b,
  f64Store: 0x39,
  i32Const: 0x41,
  f64Const: 0x44,
  i32LessUnsigned: 0x49,
  f64Equal: 0x61,
  f64NotEqual: 0x62,
  f64Less: 0x63,
  f64LessEqual: 0x65,
  i32Add: 0x6a,
  f64Abs: 0x99,
  f64Negate: 0x9a,
  f64Ceil: 0x9b,
  f64Floor: 0x9c,
  f64Sqrt: 0x9f,
  f64Add: 0xa0,
  f64Subtract: 0xa1,
  f64Multiply: 0xa2,
  f64Divide: 0xa3,
  f64Min: 0xa4,
  f64Max: 0xa5,
  f64ConvertUnsigned: 0xb8,
} as const;

/** Value types; `empty` is the result of a block that leaves nothing. */
export const valueType = { i32: 0x7f, i64: 0x7e, f64: 0x7c, empty: 0x40 } as const;
export type ValueType = typeof valueType.i32 | typeof valueType.i64 | typeof valueType.f64;
