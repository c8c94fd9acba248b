// A picture or a page as plain data: drawn by pure functions, put on the screen elsewhere. Texts stay texts on the way,
// so nothing that comes from a spec can become markup.

export interface Element {
  readonly tag: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: readonly Node[];
}

export type Node = Element | string;

type Attribute = string | number | boolean | undefined;

/** An element. An attribute that is `false` or `undefined` is left out, one that is `true` is empty. */
export function h(tag: string, attributes: Record<string, Attribute> = {}, ...children: (Node | readonly Node[] | undefined)[]): Element {
  const kept: Record<string, string> = {};
  for (const [name, value] of Object.entries(attributes)) {
    if (value !== undefined && value !== false) {
      kept[name] = value === true ? "" : typeof value === "number" ? round(value) : value;
    }
  }
  const flat = children.flat().filter((child): child is Node => child !== undefined);
  return { tag, attributes: kept, children: flat };
}

/** A place on the screen, to a tenth of a pixel. */
export function round(value: number): string {
  return String(Math.round(value * 10) / 10);
}

/** All elements for which something holds. */
export function find(node: Node, holds: (element: Element) => boolean): Element[] {
  if (typeof node === "string") {
    return [];
  }
  return [...(holds(node) ? [node] : []), ...node.children.flatMap((child) => find(child, holds))];
}

/** The text inside. */
export function textOf(node: Node): string {
  return typeof node === "string" ? node : node.children.map(textOf).join("");
}
