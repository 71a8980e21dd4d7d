/** In what order names can be gone through, and which cannot be put in an order. */
export interface Dependencies {
  /** Every name after those that it refers to, circles aside. */
  readonly order: readonly string[];
  /** Names that refer to each other, or one that refers to itself. */
  readonly circles: readonly (readonly string[])[];
}

/** A name that is being visited: its references, and how many of them were followed. */
interface Visit {
  readonly name: string;
  readonly references: readonly string[];
  followed: number;
}

/**
 * The strongly connected components of a graph of references, without recursion, since a worksheet may be a long chain.
 * Linear in names and references.
 *
 * Source: R. E. Tarjan, Depth-first search and linear graph algorithms, SIAM J. Comput. 1 (1972), section 4.
 */
export function dependenciesOf(
  names: Iterable<string>,
  referencesOf: (name: string) => readonly string[],
): Dependencies {
  const index = new Map<string, number>();
  const low = new Map<string, number>();
  const open: string[] = [];
  const isOpen = new Set<string>();
  const order: string[] = [];
  const circles: string[][] = [];
  const path: Visit[] = [];

  const enter = (name: string): void => {
    low.set(name, index.size);
    index.set(name, index.size);
    open.push(name);
    isOpen.add(name);
    path.push({ name, references: referencesOf(name), followed: 0 });
  };
  const leave = ({ name, references }: Visit): void => {
    order.push(name);
    if (low.get(name) !== index.get(name)) return;
    const component = open.splice(open.lastIndexOf(name));
    for (const member of component) isOpen.delete(member);
    if (component.length > 1 || references.includes(name)) circles.push(component);
  };
  const lower = (name: string, to: number): void => {
    low.set(name, Math.min(low.get(name)!, to));
  };
  const advance = (visit: Visit): void => {
    const next = visit.references[visit.followed++];
    if (!index.has(next)) enter(next);
    else if (isOpen.has(next)) lower(visit.name, index.get(next)!);
  };

  for (const start of names) {
    if (!index.has(start)) enter(start);
    for (let visit = path.at(-1); visit; visit = path.at(-1)) {
      if (visit.followed < visit.references.length) advance(visit);
      else {
        path.pop();
        leave(visit);
        const parent = path.at(-1);
        if (parent) lower(parent.name, low.get(visit.name)!);
      }
    }
  }
  return { order, circles };
}
