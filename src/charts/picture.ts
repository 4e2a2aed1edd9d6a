const STYLES = [
  "fill",
  "fill-opacity",
  "stroke",
  "stroke-opacity",
  "stroke-width",
  "stroke-dasharray",
  "stroke-linecap",
  "font-size",
  "font-weight",
  "font-style",
  "text-anchor",
  "font-variant-numeric",
];
const NAMESPACE = "http://www.w3.org/2000/svg";
const MARGIN = 24;
const LINE = 19;
const PIXELS_PER_UNIT = 2;

/** Breaks words into lines of at most so many letters. */
function wrap(text: string, letters: number): string[] {
  return text.split(" ").reduce<string[]>((lines, word) => {
    const last = lines.at(-1);
    if (last === undefined || last.length + word.length + 1 > letters) return [...lines, word];
    return [...lines.slice(0, -1), `${last} ${word}`];
  }, []);
}

function lineOfText(text: string, x: number, y: number, size: number, weight: string, colour: string): SVGTextElement {
  const element = document.createElementNS(NAMESPACE, "text");
  const attributes = { x, y, "font-size": size, "font-weight": weight, fill: colour };
  for (const [name, value] of Object.entries(attributes)) element.setAttribute(name, String(value));
  element.textContent = text;
  return element;
}

/** A drawing that stands alone: with its title above, its source below, and every style written out. */
export function pictureOf(drawing: SVGSVGElement, title: string, source: string): { svg: string; width: number; height: number } {
  const copy = drawing.cloneNode(true) as SVGSVGElement; // cloneNode is typed as any Node; a copy of an <svg> is one
  const originals = [drawing, ...drawing.querySelectorAll("*")];
  for (const [index, element] of [copy, ...copy.querySelectorAll("*")].entries()) {
    const style = getComputedStyle(originals[index] ?? drawing);
    for (const name of STYLES) {
      const value = style.getPropertyValue(name);
      if (value !== "") element.setAttribute(name, value);
    }
    for (const name of ["class", "tabindex", "role"]) element.removeAttribute(name);
  }
  const [width, height] = [Number(drawing.getAttribute("width")), Number(drawing.getAttribute("height"))];
  const body = getComputedStyle(document.documentElement);
  const letters = Math.floor(width / 9.2);
  const [titleLines, sourceLines] = [wrap(title, letters), wrap(source, Math.floor(width / 6.6))];
  const top = MARGIN + titleLines.length * LINE + 10;
  const outer = document.createElementNS(NAMESPACE, "svg");
  const fullWidth = width + 2 * MARGIN;
  const fullHeight = top + height + sourceLines.length * LINE + MARGIN;
  const attributes = { xmlns: NAMESPACE, width: fullWidth, height: fullHeight, "font-family": "Noto Sans, sans-serif" };
  for (const [name, value] of Object.entries(attributes)) outer.setAttribute(name, String(value));
  const ground = document.createElementNS(NAMESPACE, "rect");
  for (const [name, value] of Object.entries({ width: "100%", height: "100%", fill: body.backgroundColor }))
    ground.setAttribute(name, value);
  copy.setAttribute("x", String(MARGIN));
  copy.setAttribute("y", String(top));
  copy.setAttribute("overflow", "visible");
  outer.append(
    ground,
    ...titleLines.map((line, index) => lineOfText(line, MARGIN, MARGIN + 14 + index * LINE, 15, "600", body.color)),
    copy,
    ...sourceLines.map((line, index) => lineOfText(line, MARGIN, top + height + 20 + index * LINE, 12, "400", body.color)),
  );
  return { svg: new XMLSerializer().serializeToString(outer), width: fullWidth, height: fullHeight };
}

/** The same picture in dots, at twice its size so that it prints well. */
export async function pngOf({ svg, width, height }: ReturnType<typeof pictureOf>): Promise<Blob> {
  const image = new Image(width, height);
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  await image.decode();
  const canvas = document.createElement("canvas");
  canvas.width = width * PIXELS_PER_UNIT;
  canvas.height = height * PIXELS_PER_UNIT;
  canvas.getContext("2d")?.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve, reject) => {
    canvas.toBlob((blob) => (blob ? resolve(blob) : reject(new Error("The browser made no picture."))), "image/png");
  });
}
