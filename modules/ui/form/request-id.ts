/**
 * One id per thing the person means to do. A repeat of the same request (no answer came) carries the same id, so the shop
 * does it once; after any settled answer the next press is a new intent with a new id.
 */
export class RequestId {
  private current: string | null = null;

  constructor(private readonly make: () => string) {}

  take(): string {
    this.current ??= this.make();
    return this.current;
  }

  settle(): void {
    this.current = null;
  }
}

/** Request ids of several things a screen can do, each by its own name, kept until an answer settled that one. */
export class RequestIds {
  private readonly current = new Map<string, string>();

  constructor(private readonly make: () => string = () => crypto.randomUUID()) {}

  take(what: string): string {
    const id = this.current.get(what) ?? this.make();
    this.current.set(what, id);
    return id;
  }

  settle(what: string): void {
    this.current.delete(what);
  }
}

export class NoAnswer extends Error {}

/**
 * Waits for an answer at most `ms`. The request itself cannot be called back, which is why its id is kept.
 * @throws NoAnswer when the time is up.
 */
export async function within<T>(ms: number, work: Promise<T>): Promise<T> {
  let timer: ReturnType<typeof setTimeout> | undefined;
  const limit = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new NoAnswer("no answer in time")), ms);
  });
  try {
    return await Promise.race([work, limit]);
  } finally {
    clearTimeout(timer);
  }
}
