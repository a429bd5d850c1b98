import type { Column } from './column.ts';

/** Hands a file to the browser's downloads. */
function save(blob: Blob, name: string): void {
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}

const copied = [
  'fill',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'stroke-linejoin',
  'paint-order',
  'font-family',
  'font-size',
  'font-weight',
  'font-style',
  'text-anchor',
] as const;

/** A drawing that stands alone: what the page's style sheets gave it is written into its own attributes. */
function standalone(picture: SVGSVGElement): string {
  const copy = picture.cloneNode(true) as SVGSVGElement;
  const originals = [picture, ...picture.querySelectorAll('*')];
  [copy, ...copy.querySelectorAll('*')].forEach((element, i) => {
    const original = originals[i];
    if (original === undefined) return;
    const style = getComputedStyle(original);
    for (const property of copied) {
      const value = style.getPropertyValue(property);
      if (value !== '' && value !== 'none') element.setAttribute(property, value);
      else if (property === 'fill' || property === 'stroke') element.setAttribute(property, 'none');
    }
    element.removeAttribute('class');
  });
  const { width, height } = picture.getBoundingClientRect();
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg');
  copy.setAttribute('width', String(Math.round(width)));
  copy.setAttribute('height', String(Math.round(height)));
  return new XMLSerializer().serializeToString(copy);
}

/** Saves a drawing as SVG. */
export function saveSvg(picture: SVGSVGElement | null, name: string): void {
  if (picture !== null) save(new Blob([standalone(picture)], { type: 'image/svg+xml' }), `${name}.svg`);
}

/** Saves a drawing as PNG at 300 dots an inch (the page counts 96). */
export function savePng(picture: SVGSVGElement | null, name: string): void {
  if (picture === null) return;
  const scale = 300 / 96;
  const { width, height } = picture.getBoundingClientRect();
  const image = new Image();
  image.onload = () => {
    const canvas = document.createElement('canvas');
    canvas.width = Math.round(width * scale);
    canvas.height = Math.round(height * scale);
    const context = canvas.getContext('2d');
    if (context === null) return;
    context.fillStyle = getComputedStyle(picture).getPropertyValue('--paper') || '#fff';
    context.fillRect(0, 0, canvas.width, canvas.height);
    context.drawImage(image, 0, 0, canvas.width, canvas.height);
    canvas.toBlob((blob) => {
      if (blob !== null) save(blob, `${name}.png`);
    });
  };
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(standalone(picture))}`;
}

const quoted = (value: string) => (/[",\n]/u.test(value) ? `"${value.replaceAll('"', '""')}"` : value);

/** Saves columns as comma separated values, numbers in full. */
export function saveCsv(columns: readonly Column[], name: string): void {
  const length = Math.max(0, ...columns.map(({ values }) => values.length));
  const lines = [columns.map((column) => quoted(column.name)).join(',')];
  for (let i = 0; i < length; i++)
    lines.push(columns.map(({ values }) => quoted(String(values[i] ?? ''))).join(','));
  save(new Blob([`${lines.join('\n')}\n`], { type: 'text/csv' }), `${name}.csv`);
}
