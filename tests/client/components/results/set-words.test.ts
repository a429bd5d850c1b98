import { h, type VNode } from 'vue';
import { expect, test } from 'vitest';
import { SetWords } from '../../../../packages/client/src/components/results/SetWords.ts';
import { ConstantName } from '../../../../packages/client/src/components/results/terms.ts';

/** What is rendered, in signs: lowered in ⟨⟩, raised in ⟪⟫. */
function plain(node: unknown): string {
  if (typeof node === 'string') return node;
  if (Array.isArray(node)) return node.map(plain).join('');
  const { type, children } = node as VNode;
  const inside = plain(children);
  return type === 'sub' ? `⟨${inside}⟩` : type === 'sup' ? `⟪${inside}⟫` : inside;
}
const context = { attrs: {}, slots: {}, emit: () => undefined };
const set = (words: string) => plain(SetWords({ words }, context));
const name = (constant: string) => plain(h('span', [ConstantName({ name: constant }, context) as VNode]));

test.each([
  ['∏ C_i^{x_i}/x_i!', '∏ C⟨i⟩⟪x⟨i⟩⟫/x⟨i⟩!'],
  ['∏_{j≤x_i} θ_i(j)', '∏⟨j≤x⟨i⟩⟩ θ⟨i⟩(j)'],
  ['Σ_j v_ij(m) z_i^m', 'Σ⟨j⟩ v⟨ij⟩(m) z⟨i⟩⟪m⟫'],
  ['Circuit: p*p*p = q*q*q*q', 'Circuit: p⟪3⟫ = q⟪4⟫'],
  ['p*p[1]*p and pp*p', 'p*p⟨1⟩*p and pp*p'],
  ['−T[0,1], X[12]', '−T⟨0,1⟩, X⟨12⟩'],
  ['of few_cells and k_on', 'of few_cells and k_on'],
])('%s is set %s', (words, expected) => expect(set(words)).toBe(expected));

test.each([
  ['ks', 'k⟨s⟩'],
  ['kcat', 'k⟨cat⟩'],
  ['bpp', 'b⟨pp⟩'],
  ['a1', 'a⟨1⟩'],
  ['off', 'off'],
  ['on', 'on'],
  ['wash', 'wash'],
])('the constant %s is set %s', (constant, expected) => expect(name(constant)).toBe(expected));
