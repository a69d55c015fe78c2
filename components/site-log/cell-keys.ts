import type { KeyboardEvent } from 'react';

/** Marks a cell that takes typing, for the keys that lead from one to the next. */
export const cellMark = (month: string, field: string): { 'data-cell': string } => ({
  'data-cell': `${month}/${field}`,
});

const STEPS: Record<string, readonly [across: number, down: number]> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
  Enter: [0, 1],
};

/** Enter goes down and, under the last row, to the button; arrows move as in a spreadsheet once the caret is at the edge. */
export function moveBetweenCells(event: KeyboardEvent<HTMLInputElement>): void {
  const step = STEPS[event.key];
  if (!step || event.altKey || event.ctrlKey || event.metaKey) return;
  const input = event.currentTarget;
  const whole = input.selectionStart === 0 && input.selectionEnd === input.value.length;
  if (event.key === 'ArrowLeft' && !whole && input.selectionStart !== 0) return;
  if (event.key === 'ArrowRight' && !whole && input.selectionStart !== input.value.length) return;
  const [across, down] = event.key === 'Enter' && event.shiftKey ? [0, -1] : step;
  const sheet = input.closest('[data-sheet]');
  const [month, field] = input.dataset.cell!.split('/');
  const cells = [...(sheet?.querySelectorAll<HTMLInputElement>('input[data-cell]') ?? [])];
  const next =
    across !== 0 ? cells[cells.indexOf(input) + across] : below(cells, { month: month!, field: field! }, down);
  event.preventDefault();
  if (next) next.focus();
  else if (event.key === 'Enter') sheet?.querySelector<HTMLButtonElement>('button[data-save]')?.focus();
}

/** The next row up or down that has an open cell in this column. */
function below(
  cells: readonly HTMLInputElement[],
  from: { month: string; field: string },
  down: number,
): HTMLInputElement | undefined {
  const column = cells.filter((cell) => cell.dataset.cell!.endsWith(`/${from.field}`));
  return column[column.findIndex((cell) => cell.dataset.cell!.startsWith(from.month)) + down];
}
