import { type FunctionalComponent, h, type VNode } from 'vue';

/** A name as it is drawn: what stands at its foot, and whether that is an index. */
export interface LabelPart {
  readonly text: string;
  readonly index: boolean;
}

/** A label of species, such as "2 T[0,1] + X", in parts: indices without their brackets, and what stands between. */
export const labelParts = (label: string): readonly LabelPart[] =>
  label.split(/\[([^\]]*)\]/u).flatMap((text, i) => (text === '' ? [] : [{ text, index: i % 2 === 1 }]));

/** How far an index is lowered, and how small it is set, in parts of the letters before it. */
const foot = { size: 0.72, down: 0.24 };

/**
 * A label in a drawing, its indices lowered: T[0,1] as it is set in text. To be placed as an SVG `text` is. `dy` moves what
 * follows too, so each part after an index is raised again.
 */
export const SvgLabel: FunctionalComponent<{ label: string }> = ({ label }) => {
  const parts = labelParts(label);
  if (parts.every(({ index }) => !index)) return h('text', label);
  return h(
    'text',
    parts.map(({ text, index }, i): VNode => {
      if (index) return h('tspan', { 'font-size': `${foot.size}em`, dy: `${foot.down / foot.size}em` }, text);
      return h('tspan', parts[i - 1]?.index === true ? { dy: `${-foot.down}em` } : {}, text);
    }),
  );
};
SvgLabel.props = ['label'];
