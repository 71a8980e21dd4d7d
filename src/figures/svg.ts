/** A piece of SVG as text. */
export type Svg = string;

type Attributes = Readonly<Record<string, string | number | null>>;

/** An SVG element; attributes that are null are left out, numbers are rounded to hundredths of a pixel. */
export function element(name: string, attributes: Attributes, ...children: readonly Svg[]): Svg {
  const written = Object.entries(attributes)
    .filter((entry): entry is [string, string | number] => entry[1] !== null)
    .map(([key, value]) => ` ${key}="${typeof value === 'number' ? short(value) : escape(value)}"`)
    .join('');
  return children.length === 0
    ? `<${name}${written}/>`
    : `<${name}${written}>${children.join('')}</${name}>`;
}

/** Characters of a text element, escaped. */
export function escape(text: string): Svg {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
}

/** A pixel coordinate with at most two decimals. */
export function short(x: number): string {
  return String(Math.round(x * 100) / 100 + 0);
}
