/** Makes an element with a class and children; text children become text nodes. */
export function element<Tag extends keyof HTMLElementTagNameMap>(
  tag: Tag,
  className: string,
  ...children: (Node | string | null)[]
): HTMLElementTagNameMap[Tag] {
  const made = document.createElement(tag);
  if (className) made.className = className;
  made.append(...children.filter((child) => child !== null));
  return made;
}
