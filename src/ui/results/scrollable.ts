/** Lets the keyboard reach what scrolls: an element wider inside than outside takes part in the order of Tab. */
const watcher =
  typeof ResizeObserver === 'undefined'
    ? null
    : new ResizeObserver((entries) => {
        for (const { target } of entries) {
          if (target instanceof HTMLElement) adapt(target);
        }
      });

/** Makes an element with content that may be too wide reachable by keyboard for as long as it is; `label` names it. */
export function scrollable<Element extends HTMLElement>(element: Element, label: string): Element {
  element.dataset.label = label;
  watcher?.observe(element);
  return element;
}

function adapt(element: HTMLElement): void {
  if (!element.isConnected) {
    watcher?.unobserve(element);
    return;
  }
  if (element.scrollWidth > element.clientWidth + 1) {
    element.tabIndex = 0;
    element.setAttribute('role', 'group');
    element.setAttribute('aria-label', element.dataset.label ?? '');
  } else {
    element.removeAttribute('tabindex');
    element.removeAttribute('role');
    element.removeAttribute('aria-label');
  }
}
