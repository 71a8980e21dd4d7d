const RAISED: Readonly<Record<string, string>> = {
  '-': '⁻',
  '−': '⁻',
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
};

/** A unit as it is printed: `kg m^2` is kg m², `deg` is °. */
export function writtenUnit(unit: string): string {
  return unit
    .replace(/\^([-−]?\d+)/gu, (_, power: string) =>
      [...power].map((character) => RAISED[character] ?? character).join(''),
    )
    .replace(/\bdeg\b/gu, '°');
}
