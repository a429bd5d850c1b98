import type { Expression, FunctionName } from '@stillroom/shared/expression';

/** How tightly a typeset expression binds, so that brackets stand only where they are needed. */
const binding = { compare: 0, sum: 1, product: 2, power: 3, atom: 4 } as const;

interface Typeset {
  readonly tex: string;
  readonly binding: number;
}

const greek = new Map(
  Object.entries({
    α: 'alpha',
    β: 'beta',
    γ: 'gamma',
    δ: 'delta',
    ε: 'varepsilon',
    ζ: 'zeta',
    η: 'eta',
    θ: 'theta',
    ι: 'iota',
    κ: 'kappa',
    λ: 'lambda',
    μ: 'mu',
    ν: 'nu',
    ξ: 'xi',
    π: 'pi',
    ρ: 'rho',
    σ: 'sigma',
    τ: 'tau',
    υ: 'upsilon',
    φ: 'varphi',
    χ: 'chi',
    ψ: 'psi',
    ω: 'omega',
    Γ: 'Gamma',
    Δ: 'Delta',
    Θ: 'Theta',
    Λ: 'Lambda',
    Ξ: 'Xi',
    Π: 'Pi',
    Σ: 'Sigma',
    Υ: 'Upsilon',
    Φ: 'Phi',
    Ψ: 'Psi',
    Ω: 'Omega',
  }),
);

/** A name: "k1" is k with subscript 1, "X[1,2]" likewise, "ES" stands upright, Greek letters are Greek. */
export function nameTex(name: string): string {
  const parts = /^(.*?)((?:_?\d+)?)('*)(?:\[(.*)\])?$/u.exec(name);
  const [stem = name, digits = '', primes = '', indices = ''] = parts?.slice(1) ?? [];
  const number = digits.replace('_', '');
  const subscript = [number, indices.replaceAll(/\s/g, '')].filter((text) => text !== '').join(',');
  return `${stemTex(stem)}${primes}${subscript === '' ? '' : `_{${subscript}}`}`;
}

function stemTex(stem: string): string {
  const letters = [...stem];
  if (letters.length === 1) {
    const command = greek.get(stem);
    return command === undefined ? stem : `\\${command}`;
  }
  const upright = letters.map((letter) => {
    const command = greek.get(letter);
    if (command !== undefined) return `\\${command}{}`;
    return letter === '_' ? '\\_' : letter;
  });
  return `\\mathrm{${upright.join('')}}`;
}

/** A number in decimals, or with a power of ten where it is very large or small. */
export function numberTex(value: number): string {
  const [mantissa = '', exponent] = String(value).split('e');
  if (exponent === undefined) return mantissa;
  const power = `10^{${Number(exponent)}}`;
  if (mantissa === '1') return power;
  return mantissa === '-1' ? `-${power}` : `${mantissa} \\cdot ${power}`;
}

/** An expression, typeset. */
export function expressionTex(expression: Expression): string {
  return typeset(expression).tex;
}

/** The same as a factor of a product. */
export function factorTex(expression: Expression): string {
  return bracketed(typeset(expression), binding.product);
}

function bracketed({ tex, binding: own }: Typeset, least: number): string {
  return own < least ? `\\left(${tex}\\right)` : tex;
}

function typeset(expression: Expression): Typeset {
  switch (expression.kind) {
    case 'number': {
      const tex = numberTex(expression.value);
      return { tex, binding: /^\d+(\.\d+)?$/.test(tex) ? binding.atom : binding.sum };
    }
    case 'name':
      return { tex: nameTex(expression.name), binding: binding.atom };
    case 'negate':
      return { tex: `-${bracketed(typeset(expression.of), binding.product)}`, binding: binding.sum };
    case 'not':
      return { tex: `\\lnot ${bracketed(typeset(expression.of), binding.atom)}`, binding: binding.compare };
    case 'compare':
      return infix(
        expression.left,
        relation[expression.operator],
        expression.right,
        binding.compare,
        binding.sum,
      );
    case 'logic': {
      const sign = expression.operator === 'and' ? '\\land' : '\\lor';
      return infix(expression.left, sign, expression.right, binding.compare, binding.sum);
    }
    case 'binary':
      return binaryTex(expression);
    case 'call':
      return callTex(expression.name, expression.arguments);
  }
}

const relation = { '==': '=', '!=': '\\ne', '<': '<', '<=': '\\le', '>': '>', '>=': '\\ge' } as const;

function infix(left: Expression, sign: string, right: Expression, own: number, least: number): Typeset {
  const parts = [left, right].map((part) => bracketed(typeset(part), least));
  return { tex: parts.join(` ${sign} `), binding: own };
}

function binaryTex({ operator, left, right }: Extract<Expression, { kind: 'binary' }>): Typeset {
  const [a, b] = [typeset(left), typeset(right)];
  switch (operator) {
    case '+':
      return { tex: `${a.tex} + ${bracketed(b, binding.sum)}`, binding: binding.sum };
    case '-':
      return { tex: `${a.tex} - ${bracketed(b, binding.product)}`, binding: binding.sum };
    case '*': {
      if (left.kind === 'negate') {
        return typeset({ kind: 'negate', of: { kind: 'binary', operator, left: left.of, right } });
      }
      const tex = [a, b].map((part) => bracketed(part, binding.product));
      const sign = /^[\d.]/.test(tex[1]!) ? ' \\cdot ' : ' \\, ';
      return { tex: tex.join(sign), binding: binding.product };
    }
    case '/':
      return { tex: `\\frac{${a.tex}}{${b.tex}}`, binding: binding.product };
    case '%':
      return {
        tex: `${bracketed(a, binding.product)} \\bmod ${bracketed(b, binding.power)}`,
        binding: binding.sum,
      };
    case '^':
      return { tex: `{${bracketed(a, binding.atom)}}^{${b.tex}}`, binding: binding.power };
  }
}

const commands: Partial<Record<FunctionName, string>> = {
  ln: '\\ln',
  log10: '\\log_{10}',
  sin: '\\sin',
  cos: '\\cos',
  tan: '\\tan',
  sinh: '\\sinh',
  cosh: '\\cosh',
  tanh: '\\tanh',
  asin: '\\arcsin',
  acos: '\\arccos',
  atan: '\\arctan',
  min: '\\min',
  max: '\\max',
  exp: '\\exp',
};

function callTex(name: FunctionName, given: readonly Expression[]): Typeset {
  const parts = given.map((part) => typeset(part).tex);
  const atom = (tex: string): Typeset => ({ tex, binding: binding.atom });
  switch (name) {
    case 'sqrt':
      return atom(`\\sqrt{${parts[0]}}`);
    case 'abs':
      return atom(`\\left|${parts[0]}\\right|`);
    case 'floor':
      return atom(`\\left\\lfloor ${parts[0]} \\right\\rfloor`);
    case 'ceil':
      return atom(`\\left\\lceil ${parts[0]} \\right\\rceil`);
    case 'if':
      return atom(
        `\\begin{cases} ${parts[1]} & ${parts[0]} \\\\ ${parts[2]} & \\text{otherwise} \\end{cases}`,
      );
    case 'hill': {
      const [x, half] = given.map((part) => bracketed(typeset(part), binding.atom));
      const n = parts[2];
      return { tex: `\\frac{{${x}}^{${n}}}{{${half}}^{${n}} + {${x}}^{${n}}}`, binding: binding.product };
    }
    default:
      return atom(`${commands[name] ?? `\\mathrm{${name}}`}\\left(${parts.join(', ')}\\right)`);
  }
}
