import type { ComponentChild, VNode } from 'preact';

const asText = (text: string) =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('"', '&quot;');

/** A drawing as SVG text, one element a line, so that a golden file shows a difference where it is. */
export function svgText(drawing: VNode): string {
  return `${lines(drawing, 0).join('\n')}\n`;
}

function lines(node: ComponentChild, depth: number): string[] {
  const indent = '  '.repeat(depth);
  if (node === null || node === undefined || typeof node === 'boolean') return [];
  if (typeof node !== 'object') return [`${indent}${asText(String(node))}`];
  const { type, props } = node as VNode<Record<string, unknown>>;
  if (typeof type !== 'string') throw new Error('a drawing is made of elements, not of components');
  const { children, ...attributes } = props;
  // A file has to say what it is; in a page the parser knows.
  const given = type === 'svg' ? { xmlns: 'http://www.w3.org/2000/svg', ...attributes } : attributes;
  const told = Object.entries(given).map(([name, value]) => ` ${name}="${asText(String(value))}"`);
  const inside = [children].flat(9).flatMap((child) => lines(child as ComponentChild, depth + 1));
  const open = `${indent}<${type}${told.join('')}`;
  return inside.length === 0 ? [`${open}/>`] : [`${open}>`, ...inside, `${indent}</${type}>`];
}

/** Every element of a drawing, outermost first. */
export function elementsOf(drawing: VNode): { type: string; props: Record<string, unknown> }[] {
  const { type, props } = drawing as VNode<Record<string, unknown>>;
  const children = [props.children].flat(9).filter((child) => typeof child === 'object' && child !== null);
  return [{ type: String(type), props }, ...children.flatMap((child) => elementsOf(child as VNode))];
}
