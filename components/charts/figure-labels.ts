/** Boxes of text in a figure, and where one finds a place that no other takes. Widths are estimates for 13 px type. */
export interface Box {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** Public Sans at 13 px runs to about 6.7 px a character, 7.1 px in its 600 weight. */
export function textWidth(text: string, bold = false): number {
  return text.length * (bold ? 7.1 : 6.7);
}

export function overlaps(one: Box, other: Box): boolean {
  return (
    one.x < other.x + other.width &&
    other.x < one.x + one.width &&
    one.y < other.y + other.height &&
    other.y < one.y + one.height
  );
}

export interface Candidate<Place> {
  place: Place;
  box: Box;
}

/** The first candidate that lies within the bounds and touches nothing placed before it. */
export function firstFree<Place>(
  candidates: readonly Candidate<Place>[],
  taken: readonly Box[],
  bounds: { left: number; right: number },
): Candidate<Place> | null {
  return (
    candidates.find(
      ({ box }) =>
        box.x >= bounds.left && box.x + box.width <= bounds.right && !taken.some((other) => overlaps(box, other)),
    ) ?? null
  );
}
