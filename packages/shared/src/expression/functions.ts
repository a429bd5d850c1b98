/** Elementary functions for results. */
export const elementary = {
  exp: Math.exp,
  ln: Math.log,
  log10: Math.log10,
  pow: Math.pow,
  sqrt: Math.sqrt,
  abs: Math.abs,
  sin: Math.sin,
  cos: Math.cos,
  tan: Math.tan,
  sinh: Math.sinh,
  cosh: Math.cosh,
  tanh: Math.tanh,
  asin: Math.asin,
  acos: Math.acos,
  atan: Math.atan,
  floor: Math.floor,
  ceil: Math.ceil,
  round: (x: number): number => Math.round(x),
  hill: (x: number, k: number, n: number): number => {
    const a = Math.pow(x, n);
    return a / (Math.pow(k, n) + a);
  },
};
