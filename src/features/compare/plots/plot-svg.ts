const drawnProperties = [
  "fill",
  "fill-opacity",
  "stroke",
  "stroke-width",
  "stroke-dasharray",
  "stroke-opacity",
  "stroke-linejoin",
  "opacity",
  "paint-order",
];
const textProperties = ["font-family", "font-size", "font-weight", "text-anchor"];
const svgSpace = "http://www.w3.org/2000/svg";

/**
 * A drawing of the page as an SVG file that looks the same anywhere: colours and letters as they
 * stand in the page are written into each element as attributes, on a ground of the page's own.
 */
export function plotSvg(drawing: SVGSVGElement, title: string): string {
  const copy = drawing.cloneNode(true) as SVGSVGElement;
  const [sources, targets] = [elementsOf(drawing), elementsOf(copy)];
  for (const [place, source] of sources.entries()) {
    const target = targets[place];
    if (target) writeLook(source, target);
  }
  const { width, height } = sizeOf(drawing);
  copy.setAttribute("xmlns", svgSpace);
  copy.setAttribute("width", String(width));
  copy.setAttribute("height", String(height));
  copy.setAttribute("viewBox", `0 0 ${width} ${height}`);
  const ground = document.createElementNS(svgSpace, "rect");
  ground.setAttribute("width", "100%");
  ground.setAttribute("height", "100%");
  ground.setAttribute(
    "fill",
    getComputedStyle(document.documentElement).getPropertyValue("--paper").trim() || "white",
  );
  copy.prepend(ground);
  const name = document.createElementNS(svgSpace, "title");
  name.textContent = title;
  copy.prepend(name);
  return new XMLSerializer().serializeToString(copy);
}

function elementsOf(root: Element): Element[] {
  return [root, ...root.querySelectorAll("*")];
}

function writeLook(source: Element, target: Element): void {
  const look = getComputedStyle(source);
  const isText = /^(text|tspan)$/i.test(source.tagName);
  for (const property of isText ? [...drawnProperties, ...textProperties] : drawnProperties) {
    const value = look.getPropertyValue(property);
    if (value) target.setAttribute(property, value);
  }
  for (const name of ["class", "style", "tabindex", "role"]) target.removeAttribute(name);
}

/** Size of a drawing in pixels, by its own attributes: it may be out of sight. */
export function sizeOf(drawing: SVGSVGElement): { width: number; height: number } {
  const [width, height] = ["width", "height"].map((name) => Number(drawing.getAttribute(name)));
  return { width: width || 560, height: height || 240 };
}

/** The same drawing as a PNG, twice as fine as the page, made in this browser. */
export async function plotPng(drawing: SVGSVGElement, title: string): Promise<Blob> {
  const { width, height } = sizeOf(drawing);
  const url = URL.createObjectURL(
    new Blob([plotSvg(drawing, title)], { type: "image/svg+xml;charset=utf-8" }),
  );
  try {
    const picture = new Image();
    picture.src = url;
    await picture.decode();
    const canvas = document.createElement("canvas");
    [canvas.width, canvas.height] = [width * 2, height * 2];
    canvas.getContext("2d")?.drawImage(picture, 0, 0, canvas.width, canvas.height);
    return await new Promise((done, failed) => {
      canvas.toBlob((blob) => (blob ? done(blob) : failed(new Error("no picture"))), "image/png");
    });
  } finally {
    URL.revokeObjectURL(url);
  }
}
