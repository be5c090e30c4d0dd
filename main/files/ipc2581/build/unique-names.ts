/** Gives every name once: the wanted one, or with the next free number behind it. */
export class UniqueNames {
  private readonly taken: Set<string>;
  private readonly lastNumber = new Map<string, number>();

  constructor(taken: Iterable<string> = []) {
    this.taken = new Set(taken);
  }

  free(wanted: string): string {
    let name = wanted;
    let number = this.lastNumber.get(wanted) ?? 1;
    while (this.taken.has(name)) name = `${wanted}#${++number}`;
    this.lastNumber.set(wanted, number);
    this.taken.add(name);
    return name;
  }
}
