/** Lets so many run at a time; the others wait their turn in the order they came. */
export class RequestLanes {
  private free: number;
  private readonly waiting: (() => void)[] = [];

  constructor(lanes: number) {
    this.free = lanes;
  }

  async run<Answer>(act: () => Promise<Answer>): Promise<Answer> {
    if (this.free > 0) this.free--;
    else await new Promise<void>((resolve) => this.waiting.push(resolve));
    try {
      return await act();
    } finally {
      const next = this.waiting.shift();
      if (next) next();
      else this.free++;
    }
  }
}
