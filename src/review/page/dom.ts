/** Elements made by calls: data only ever becomes text or an attribute's value, never markup. */

type Value = string | number | boolean | undefined | ((event: never) => void);
export type Child = Node | string | null | undefined | false;

/** Functions become listeners of the event they are named by (`onclick`); `true` an empty attribute, `false` and `undefined` none. */
export function el<Tag extends keyof HTMLElementTagNameMap>(
  tag: Tag,
  attributes: Record<string, Value> = {},
  ...children: Child[]
): HTMLElementTagNameMap[Tag] {
  return made(document.createElement(tag), attributes, children);
}

export function svg<Tag extends keyof SVGElementTagNameMap>(
  tag: Tag,
  attributes: Record<string, Value> = {},
  ...children: Child[]
): SVGElementTagNameMap[Tag] {
  return made(document.createElementNS("http://www.w3.org/2000/svg", tag), attributes, children);
}

function made<Made extends Element>(
  element: Made,
  attributes: Record<string, Value>,
  children: Child[],
): Made {
  for (const [name, value] of Object.entries(attributes)) setAttribute(element, name, value);
  fill(element, ...children);
  return element;
}

export function setAttribute(element: Element, name: string, value: Value): void {
  if (typeof value === "function") element.addEventListener(name.slice(2), value as EventListener);
  else if (value === undefined || value === false) element.removeAttribute(name);
  else element.setAttribute(name, value === true ? "" : String(value));
}

/** Puts these children in the place of those that are there. */
export function fill(parent: Element, ...children: Child[]): void {
  parent.replaceChildren(
    ...children.filter(
      (child): child is Node | string => child !== null && child !== undefined && child !== false,
    ),
  );
}

let ids = 0;
/** For `aria-labelledby` and `for`. */
export const freshId = (): string => `tb${++ids}`;
