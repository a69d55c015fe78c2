/** Sites by the moment at which something happens to them: a binary heap that holds its memory from draw to draw. */
export interface MomentQueue {
  size: number;
  moments: Float64Array;
  entries: Int32Array;
}

export function createMomentQueue(capacity: number): MomentQueue {
  return { size: 0, moments: new Float64Array(capacity), entries: new Int32Array(capacity) };
}

/** Adds an entry; the capacity is not to be passed. Equal moments come out in the order of their entries. */
export function pushMoment(queue: MomentQueue, moment: number, entry: number): void {
  const { moments, entries } = queue;
  let place = queue.size;
  queue.size += 1;
  while (place > 0) {
    const parent = (place - 1) >> 1;
    if (!isBefore(moment, entry, moments[parent] as number, entries[parent] as number)) break;
    moments[place] = moments[parent] as number;
    entries[place] = entries[parent] as number;
    place = parent;
  }
  moments[place] = moment;
  entries[place] = entry;
}

/** Takes the earliest entry away and returns it; the queue is not empty. */
export function popMoment(queue: MomentQueue): number {
  const { moments, entries } = queue;
  const earliest = entries[0] as number;
  queue.size -= 1;
  const moment = moments[queue.size] as number;
  const entry = entries[queue.size] as number;
  let place = 0;
  for (;;) {
    let child = 2 * place + 1;
    if (child >= queue.size) break;
    const other = child + 1;
    if (
      other < queue.size &&
      isBefore(moments[other] as number, entries[other] as number, moments[child] as number, entries[child] as number)
    ) {
      child = other;
    }
    if (!isBefore(moments[child] as number, entries[child] as number, moment, entry)) break;
    moments[place] = moments[child] as number;
    entries[place] = entries[child] as number;
    place = child;
  }
  moments[place] = moment;
  entries[place] = entry;
  return earliest;
}

function isBefore(moment: number, entry: number, otherMoment: number, otherEntry: number): boolean {
  return moment < otherMoment || (moment === otherMoment && entry < otherEntry);
}
