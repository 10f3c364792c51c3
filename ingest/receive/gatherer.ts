/** What became of one of a group: it is done, it failed by itself, or it is to be done alone. */
export type Outcome<Answer> =
  { kind: 'done'; answer: Answer } | { kind: 'failed'; error: unknown } | { kind: 'alone' };

interface Work<Item, Answer> {
  /** Does a group at once, all or nothing but for those that it leaves for doing alone; outcomes stand beside the items. */
  together(items: readonly Item[]): Promise<Outcome<Answer>[]>;
  alone(item: Item): Promise<Answer>;
  /** Items of one key are done in their order, of each key in one group at a time. */
  keyOf(item: Item): number;
  sizeOf(item: Item): number;
  /** Whether what fails a group would fail each of it. */
  isHopeless(error: unknown): boolean;
}

interface Bounds {
  groupsAtOnce: number;
  /** Of one group: how many items, and how large all together; an item that is larger goes with none. */
  mostItems: number;
  mostSize: number;
}

interface Waiting<Item, Answer> {
  item: Item;
  resolve: (answer: Answer | Promise<Answer>) => void;
  reject: (error: unknown) => void;
}

/**
 * Lets what waits at the same moment share work: whatever came while the groups before were under way makes the next one. Nothing waits
 * for company. What fails as a group is done one by one, so that none suffers from another.
 */
export class Gatherer<Item, Answer> {
  private waiting: Waiting<Item, Answer>[] = [];
  /** Keys that are being done. */
  private readonly busy = new Set<number>();
  private groups = 0;
  private isStarting = false;

  constructor(
    private readonly work: Work<Item, Answer>,
    private readonly bounds: Bounds,
  ) {}

  take(item: Item): Promise<Answer> {
    return new Promise((resolve, reject) => {
      this.waiting.push({ item, resolve, reject });
      this.startSoon();
    });
  }

  /** After what else is ready in this turn of the event loop, which may bring company. */
  private startSoon(): void {
    if (this.isStarting) return;
    this.isStarting = true;
    setImmediate(() => {
      this.isStarting = false;
      while (this.groups < this.bounds.groupsAtOnce) {
        const group = this.nextGroup();
        if (group.length === 0) return;
        void this.run(group);
      }
    });
  }

  private nextGroup(): Waiting<Item, Answer>[] {
    const { mostItems, mostSize } = this.bounds;
    const group: Waiting<Item, Answer>[] = [];
    const left: Waiting<Item, Answer>[] = [];
    const passedOver = new Set(this.busy);
    let size = 0;
    for (const one of this.waiting) {
      const key = this.work.keyOf(one.item);
      const ownSize = this.work.sizeOf(one.item);
      const hasRoom = group.length === 0 || (group.length < mostItems && size + ownSize <= mostSize);
      if (hasRoom && !passedOver.has(key)) {
        group.push(one);
        size += ownSize;
      } else {
        // A later one of the key must not overtake it.
        passedOver.add(key);
        left.push(one);
      }
    }
    this.waiting = left;
    return group;
  }

  private async run(group: Waiting<Item, Answer>[]): Promise<void> {
    const keys = new Set(group.map(({ item }) => this.work.keyOf(item)));
    for (const key of keys) this.busy.add(key);
    this.groups += 1;
    const outcomes = await this.outcomesOf(group);
    this.groups -= 1;
    for (const key of keys) {
      const own = group.flatMap((one, at) => (this.work.keyOf(one.item) === key ? [{ one, at }] : []));
      void this.settle(own.map(({ one, at }) => ({ one, outcome: outcomes[at] ?? { kind: 'alone' } }))).then(
        () => {
          this.busy.delete(key);
          this.startSoon();
        },
      );
    }
  }

  private async outcomesOf(group: Waiting<Item, Answer>[]): Promise<Outcome<Answer>[]> {
    try {
      return await this.work.together(group.map(({ item }) => item));
    } catch (error) {
      const isFinal = group.length === 1 || this.work.isHopeless(error);
      return group.map(() => (isFinal ? { kind: 'failed', error } : { kind: 'alone' }));
    }
  }

  /** Answers those of one key, doing in their order what is to be done alone. */
  private async settle(own: { one: Waiting<Item, Answer>; outcome: Outcome<Answer> }[]): Promise<void> {
    for (const { one, outcome } of own) {
      if (outcome.kind === 'done') one.resolve(outcome.answer);
      else if (outcome.kind === 'failed') one.reject(outcome.error);
      else await this.work.alone(one.item).then(one.resolve, one.reject);
    }
  }
}
