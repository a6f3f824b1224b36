/** Turns a picture of the page into text or an image that stands alone, with the colours it has on the page. */

const COPIED = [
  'fill',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'opacity',
  'font-size',
  'font-family',
  'font-weight',
];

/** The picture as a file of its own. */
export function svgText(svg: SVGSVGElement): string {
  const copy = svg.cloneNode(true) as SVGSVGElement;
  const [from, to] = [svg.querySelectorAll('*'), copy.querySelectorAll('*')];
  from.forEach((element, index) => {
    const style = getComputedStyle(element);
    for (const name of COPIED) {
      const value = style.getPropertyValue(name);
      if (value !== '') to[index]!.setAttribute(name, value);
    }
    to[index]!.removeAttribute('class');
    to[index]!.removeAttribute('tabindex');
  });
  return new XMLSerializer().serializeToString(copy);
}

/** The picture as a PNG of twice its size on the ground of the page. */
export async function pngOf(svg: SVGSVGElement): Promise<Blob> {
  const { width, height } = svg.viewBox.baseVal;
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svgText(svg))}`;
  await image.decode();
  const canvas = document.createElement('canvas');
  [canvas.width, canvas.height] = [2 * width, 2 * height];
  const context = canvas.getContext('2d')!;
  context.fillStyle = getComputedStyle(document.body).backgroundColor;
  context.fillRect(0, 0, canvas.width, canvas.height);
  context.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve, reject) =>
    canvas.toBlob((blob) => (blob === null ? reject(new Error('no image')) : resolve(blob)), 'image/png'),
  );
}
