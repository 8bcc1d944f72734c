/**
 * A figure as a file: the drawn SVG made self-contained (colours and lines resolved, fonts by their names, a title and a description),
 * and the same as a PNG at twice its size. Runs in the browser; nothing is sent anywhere.
 */

/** What a style sheet gives a drawing; written into each element of the copy. */
const PROPERTIES = [
  'fill',
  'fill-opacity',
  'stroke',
  'stroke-opacity',
  'stroke-width',
  'stroke-dasharray',
  'stroke-linecap',
  'stroke-linejoin',
  'paint-order',
  'opacity',
  'font-size',
  'font-style',
  'font-weight',
  'text-anchor',
  'dominant-baseline',
  'visibility',
  'display',
];

/** The bundled faces by the names under which they are installed elsewhere, with what stands in for them. */
const SERIF = 'Literata, Georgia, "Times New Roman", serif';
const SANS = '"Public Sans", "Helvetica Neue", Arial, sans-serif';

const PNG_SCALE = 2;

export interface PictureWords {
  title: string;
  description: string;
}

/** The largest drawing of a figure; samples beside names are drawings too. null: the figure is not drawn, or not yet. */
export function findDrawing(figure: Element): SVGSVGElement | null {
  const drawings = [...figure.querySelectorAll('svg')];
  const areaOf = (svg: SVGSVGElement) => svg.clientWidth * svg.clientHeight;
  return drawings.reduce<SVGSVGElement | null>(
    (best, svg) => (areaOf(svg) > (best ? areaOf(best) : MIN_AREA) ? svg : best),
    null,
  );
}

/** CSS pixels: a sample of a line is smaller, a chart on the narrowest phone larger. */
const MIN_AREA = 10_000;

export function writeSvg(svg: SVGSVGElement, { title, description }: PictureWords): string {
  const copy = svg.cloneNode(true) as SVGSVGElement;
  resolveStyles(svg, copy);
  const { clientWidth: width, clientHeight: height } = svg;
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg');
  copy.setAttribute('width', String(width));
  copy.setAttribute('height', String(height));
  copy.setAttribute('viewBox', `0 0 ${width} ${height}`);
  copy.setAttribute('role', 'img');
  copy.removeAttribute('aria-hidden');
  const paper = makeElement(svg, 'rect');
  paper.setAttribute('width', '100%');
  paper.setAttribute('height', '100%');
  paper.setAttribute('fill', getComputedStyle(svg.ownerDocument.documentElement).backgroundColor);
  copy.prepend(makeElement(svg, 'title', title), makeElement(svg, 'desc', description), paper);
  return new XMLSerializer().serializeToString(copy);
}

function makeElement(svg: SVGSVGElement, name: string, text = ''): Element {
  const element = svg.ownerDocument.createElementNS('http://www.w3.org/2000/svg', name);
  element.textContent = text;
  return element;
}

/** Element by element: the copy has the same ones in the same order. */
function resolveStyles(original: Element, copy: Element): void {
  const style = getComputedStyle(original);
  const rules = PROPERTIES.map((property) => `${property}:${style.getPropertyValue(property)}`);
  if (original.tagName === 'text' || original.tagName === 'tspan') {
    rules.push(`font-family:${/literata/i.test(style.fontFamily) ? SERIF : SANS}`);
  }
  // What stands in attributes may name variables that the file does not know.
  for (const name of [...PROPERTIES, 'class']) copy.removeAttribute(name);
  copy.setAttribute('style', rules.join(';'));
  for (let index = 0; index < original.children.length; index++) {
    resolveStyles(original.children[index]!, copy.children[index]!);
  }
}

/** @returns null when the browser cannot draw it */
export async function drawPng(svgText: string): Promise<Blob | null> {
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svgText)}`;
  try {
    await image.decode();
  } catch {
    return null;
  }
  const canvas = document.createElement('canvas');
  canvas.width = image.naturalWidth * PNG_SCALE;
  canvas.height = image.naturalHeight * PNG_SCALE;
  canvas.getContext('2d')?.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve) => canvas.toBlob(resolve, 'image/png'));
}

/** Hands a file to the reader's browser. */
export function saveFile(name: string, content: Blob): void {
  const address = URL.createObjectURL(content);
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  URL.revokeObjectURL(address);
}

/** "Ostrel’s share, by month" -> "ostrel-s-share-by-month": letters and digits of any script, no more than a file system takes. */
export function nameFile(title: string, ending: string): string {
  const plain = title
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-+|-+$/g, '');
  return `${plain.slice(0, 80) || 'figure'}.${ending}`;
}
