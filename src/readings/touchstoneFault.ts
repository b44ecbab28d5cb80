/** What is wrong with a Touchstone file, and in which line, counted from 1. */
export class TouchstoneFault extends Error {
  readonly line: number;

  constructor(line: number, message: string) {
    super(message);
    this.name = "TouchstoneFault";
    this.line = line;
  }
}
