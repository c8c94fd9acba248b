// Puts a tree on the screen. Elements are made one by one and texts set as texts: no markup is ever read.

import type { Node } from "./tree";

const SVG = "http://www.w3.org/2000/svg";

/** The tree as nodes of the document. */
export function mount(node: Node, inSvg = false): globalThis.Node {
  if (typeof node === "string") {
    return document.createTextNode(node);
  }
  const svg = inSvg || node.tag === "svg";
  const element = svg ? document.createElementNS(SVG, node.tag) : document.createElement(node.tag);
  for (const [name, value] of Object.entries(node.attributes)) {
    element.setAttribute(name, value);
  }
  for (const child of node.children) {
    element.append(mount(child, svg));
  }
  return element;
}

/** Shows another page; focus, and how far boxes are scrolled, stay where they were. */
export function replace(place: HTMLElement, nodes: readonly Node[]): void {
  const focused = document.activeElement?.id ?? "";
  const boxes = [...place.querySelectorAll<HTMLElement>("[data-scrolls]")];
  const scrolled = boxes.map((box) => [box.id, box.scrollTop, box.scrollLeft] as const);
  place.replaceChildren(...nodes.map((node) => mount(node)));
  for (const [id, top, left] of scrolled) {
    document.getElementById(id)?.scrollTo({ top, left, behavior: "instant" });
  }
  if (focused !== "") {
    document.getElementById(focused)?.focus({ preventScroll: true });
  }
}
