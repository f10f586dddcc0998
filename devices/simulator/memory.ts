/** What a float keeps until it is acknowledged, oldest first; when it is full the oldest go. */
export class Memory<T> {
  private readonly items: T[] = [];
  private lost = 0;

  constructor(private readonly capacity: number) {}

  get size(): number {
    return this.items.length;
  }

  /** How many had to go unsent. */
  get overwritten(): number {
    return this.lost;
  }

  add(item: T): void {
    this.items.push(item);
    if (this.items.length <= this.capacity) return;
    this.items.shift();
    this.lost += 1;
  }

  /** Takes the oldest out, to be sent. */
  take(count: number): T[] {
    return this.items.splice(0, count);
  }
}
