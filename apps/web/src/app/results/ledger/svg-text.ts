/** What a drawing takes from the page's styles; a file of its own has to carry it along. */
const STYLES = [
  'fill',
  'fill-opacity',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'stroke-linejoin',
  'paint-order',
  'font-family',
  'font-size',
  'font-weight',
  'text-anchor',
] as const;

/**
 * A drawing as the text of a file that stands alone: every style written into it, on paper of its own, in the light set whatever the
 * page shows, without what only a pointer leaves behind.
 * @param transient selects what does not belong into the file
 */
export function svgText(drawing: SVGSVGElement, transient: string): string {
  const { documentElement } = drawing.ownerDocument;
  const theme = documentElement.getAttribute('data-theme');
  documentElement.setAttribute('data-theme', 'light');
  const copy = drawing.cloneNode(true) as SVGSVGElement;
  const originals = [...drawing.querySelectorAll('*')];
  [...copy.querySelectorAll('*')].forEach((element, i) => {
    const original = originals[i];
    if (original === undefined) return;
    const style = getComputedStyle(original);
    for (const name of STYLES) element.setAttribute(name, style.getPropertyValue(name));
    element.removeAttribute('class');
    for (const { name } of [...element.attributes]) if (name.startsWith('_ng')) element.removeAttribute(name);
    if (original.matches(transient)) element.setAttribute('data-transient', '');
  });
  const paper = getComputedStyle(documentElement).getPropertyValue('--rb-sheet').trim();
  if (theme === null) documentElement.removeAttribute('data-theme');
  else documentElement.setAttribute('data-theme', theme);

  for (const element of copy.querySelectorAll('[data-transient]')) element.remove();
  const [, , width = '0', height = '0'] = (copy.getAttribute('viewBox') ?? '').split(' ');
  const background = drawing.ownerDocument.createElementNS('http://www.w3.org/2000/svg', 'rect');
  for (const [name, value] of Object.entries({ width, height, fill: paper })) background.setAttribute(name, value);
  copy.prepend(background);
  copy.setAttribute('width', width);
  copy.setAttribute('height', height);
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg');
  for (const { name } of [...copy.attributes]) if (name.startsWith('_ng')) copy.removeAttribute(name);
  return `<?xml version="1.0" encoding="UTF-8"?>\n${new XMLSerializer().serializeToString(copy)}`;
}
