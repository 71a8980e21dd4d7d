/** A drag of one number, from its first move to its end, which is one undo step. */
export interface NumberDragging {
  move(numbers: ReadonlyMap<string, string>): void;
  finish(): void;
  cancel(): void;
}

/** How the side column changes numbers of the text. */
export interface NumberControl {
  write(name: string, text: string): void;
  drag(name: string): NumberDragging;
}
