/** Where a function of two variables is largest, and how it bends there. */
export interface Mode {
  x: number;
  y: number;
  value: number;
  /** Covariance of the normal approximation: the inverse of minus the Hessian. */
  covariance: { xx: number; xy: number; yy: number };
}

type Surface = (x: number, y: number) => number;

/**
 * The mode of a smooth log density of two variables, found by Nelder & Mead's simplex and then polished by Newton steps
 * with fourth-order central differences (of step 0.001, so the variables are to be of order 1, such as logarithms).
 *
 * @param surface a log density; -Infinity outside its domain
 * @param start a point inside the domain
 * @param scale size of the first simplex
 * @see Nelder & Mead 1965, Comput J 7:308
 */
export function findMode(surface: Surface, start: { x: number; y: number }, scale = 0.5): Mode {
  let { x, y, value } = climb(surface, start, scale);
  for (let step = 0; step < 30; step += 1) {
    const slope = derivatives(surface, x, y, value);
    const determinant = slope.xx * slope.yy - slope.xy * slope.xy;
    if (!(slope.xx < 0 && determinant > 0)) break;
    const moveX = (slope.xy * slope.y - slope.yy * slope.x) / determinant;
    const moveY = (slope.xy * slope.x - slope.xx * slope.y) / determinant;
    let shrink = 1;
    let next = surface(x + moveX, y + moveY);
    while (!(next >= value - 1e-9) && shrink > 1e-3) {
      shrink /= 2;
      next = surface(x + shrink * moveX, y + shrink * moveY);
    }
    if (!(next >= value - 1e-9)) break;
    x += shrink * moveX;
    y += shrink * moveY;
    value = next;
    if (Math.abs(moveX) + Math.abs(moveY) < 1e-10) break;
  }
  return { x, y, value, covariance: covarianceAt(surface, x, y, value) };
}

function covarianceAt(surface: Surface, x: number, y: number, value: number): Mode['covariance'] {
  const bend = derivatives(surface, x, y, value);
  const determinant = bend.xx * bend.yy - bend.xy * bend.xy;
  if (bend.xx < 0 && determinant > 0) {
    return { xx: -bend.yy / determinant, xy: bend.xy / determinant, yy: -bend.xx / determinant };
  }
  // Not a peak in every direction (a ridge up to rounding): the grid widens from one unit.
  return { xx: bend.xx < 0 ? -1 / bend.xx : 1, xy: 0, yy: bend.yy < 0 ? -1 / bend.yy : 1 };
}

const STEP = 1e-3;

function derivatives(surface: Surface, x: number, y: number, value: number) {
  const alongX = alongLine((move) => surface(x + move, y), value);
  const alongY = alongLine((move) => surface(x, y + move), value);
  const cross = (h: number): number =>
    (surface(x + h, y + h) - surface(x + h, y - h) - surface(x - h, y + h) + surface(x - h, y - h)) / (4 * h * h);
  // Richardson's extrapolation of the second-order cross difference.
  const xy = (4 * cross(STEP) - cross(2 * STEP)) / 3;
  return { x: alongX.first, y: alongY.first, xx: alongX.second, yy: alongY.second, xy };
}

function alongLine(line: (move: number) => number, centre: number): { first: number; second: number } {
  const up = line(STEP);
  const down = line(-STEP);
  const up2 = line(2 * STEP);
  const down2 = line(-2 * STEP);
  return {
    first: (8 * (up - down) - (up2 - down2)) / (12 * STEP),
    second: (16 * (up + down) - (up2 + down2) - 30 * centre) / (12 * STEP * STEP),
  };
}

interface Vertex {
  x: number;
  y: number;
  value: number;
}

function climb(surface: Surface, start: { x: number; y: number }, scale: number): Vertex {
  const at = (x: number, y: number): Vertex => {
    const value = surface(x, y);
    return { x, y, value: Number.isNaN(value) ? -Infinity : value };
  };
  let [best, middle, worst] = [at(start.x, start.y), at(start.x + scale, start.y), at(start.x, start.y + scale)];
  for (let turn = 0; turn < 400; turn += 1) {
    [best, middle, worst] = [best, middle, worst].sort((a, b) => b.value - a.value) as [Vertex, Vertex, Vertex];
    const size = Math.abs(best.x - worst.x) + Math.abs(best.y - worst.y) + Math.abs(best.x - middle.x);
    if (size + Math.abs(best.y - middle.y) < 1e-5) break;
    const centreX = (best.x + middle.x) / 2;
    const centreY = (best.y + middle.y) / 2;
    const reach = (factor: number): Vertex =>
      at(centreX + factor * (worst.x - centreX), centreY + factor * (worst.y - centreY));
    const mirrored = reach(-1);
    if (mirrored.value > best.value) {
      const further = reach(-2);
      worst = further.value > mirrored.value ? further : mirrored;
    } else if (mirrored.value > middle.value) {
      worst = mirrored;
    } else {
      const inner = reach(mirrored.value > worst.value ? -0.5 : 0.5);
      if (inner.value > worst.value) worst = inner;
      else {
        middle = at((best.x + middle.x) / 2, (best.y + middle.y) / 2);
        worst = at((best.x + worst.x) / 2, (best.y + worst.y) / 2);
      }
    }
  }
  return [best, middle, worst].reduce((a, b) => (b.value > a.value ? b : a));
}
