// From where and how strong: a petal a sector of the compass, its length the share of all, its parts the classes of
// strength from the middle outward. A petal points to where the wind comes from.

import type { Area } from './figure.ts';
import { writeText, type Look, type Pen } from './pen.ts';
import { scaleColour, type ColourScale, type ValueRange } from './scales.ts';

export interface Rose {
  /** Counts, `sector * classes.length + class`; the first sector lies around north, the next clockwise. */
  readonly counts: readonly number[];
  /** The classes from weak to strong: words with their unit, and the value that gives the colour. */
  readonly classes: readonly { readonly words: string; readonly value: number }[];
  readonly scale: ColourScale;
  readonly range: ValueRange;
}

const STEPS = [0.5, 1, 2, 5, 10, 20, 25, 50, 100];
/** Part of a sector that its petal fills. */
const FILLED = 0.86;
const KEY_ROW = 20;

/** Shares in 100 that the rings stand at; the last is the outer one. */
export function roseRings(longest: number): number[] {
  const step = STEPS.find((candidate) => longest <= 4 * candidate) ?? 100;
  const count = Math.max(1, Math.ceil(longest / step - 1e-9));
  return Array.from({ length: count }, (_, k) => (k + 1) * step);
}

export function drawRose(pen: Pen, area: Area, rose: Rose, look: Look): void {
  const { theme, ratio } = look;
  const classes = rose.classes.length;
  const sectors = rose.counts.length / classes;
  const total = rose.counts.reduce((sum, count) => sum + count, 0);
  const share = (sector: number, upTo: number): number => {
    let sum = 0;
    for (let k = 0; k < upTo; k++) sum += rose.counts[sector * classes + k]!;
    return total === 0 ? 0 : (100 * sum) / total;
  };
  const longest = Math.max(...Array.from({ length: sectors }, (_, sector) => share(sector, classes)));
  const rings = roseRings(longest);
  const outer = rings.at(-1)!;
  const keyHeight = KEY_ROW * classes * ratio;
  const beside = area.width > 1.5 * (area.height - keyHeight);
  const room = beside ? area : { ...area, height: area.height - keyHeight };
  const across = beside ? area.width - 132 * ratio : area.width;
  const radius = Math.max(10 * ratio, Math.min(across, room.height) / 2 - 20 * ratio);
  const [x, y] = [area.left + across / 2, area.top + room.height / 2];

  pen.strokeStyle = theme.rule;
  pen.lineWidth = ratio;
  for (const ring of rings) {
    pen.beginPath();
    pen.arc(x, y, (ring / outer) * radius, 0, 2 * Math.PI);
    pen.stroke();
  }
  const width = ((2 * Math.PI) / sectors) * FILLED;
  for (let sector = 0; sector < sectors; sector++) {
    const middle = (2 * Math.PI * sector) / sectors - Math.PI / 2;
    for (let k = 0; k < classes; k++) {
      const [from, to] = [share(sector, k), share(sector, k + 1)];
      if (to === from) continue;
      pen.beginPath();
      pen.arc(x, y, (to / outer) * radius, middle - width / 2, middle + width / 2);
      pen.arc(x, y, (from / outer) * radius, middle + width / 2, middle - width / 2, true);
      pen.closePath();
      pen.fillStyle = colourOf(rose, k);
      pen.fill();
    }
  }
  for (const [k, name] of ['N', 'E', 'S', 'W'].entries()) {
    const angle = (k * Math.PI) / 2 - Math.PI / 2;
    const [px, py] = [x + (radius + 11 * ratio) * Math.cos(angle), y + (radius + 11 * ratio) * Math.sin(angle)];
    writeText(pen, look, name, px, py, { align: 'center', baseline: 'middle' });
  }
  // Ring numbers stand between two petals, on the side where the fewest jets come from.
  const thinnest = thinnestGap(sectors, (sector) => share(sector, classes));
  const angle = (2 * Math.PI * (thinnest + 0.5)) / sectors - Math.PI / 2;
  for (const ring of rings) {
    const away = (ring / outer) * radius;
    const text = ring === outer ? `${ring} in 100` : String(ring);
    writeText(pen, look, text, x + away * Math.cos(angle), y + away * Math.sin(angle), {
      size: 11,
      align: 'center',
      baseline: 'middle',
      rimmed: true,
    });
  }
  drawKey(
    pen,
    beside ? area.left + across + 8 * ratio : area.left,
    beside ? y - keyHeight / 2 : area.top + room.height,
    rose,
    look,
  );
}

function colourOf({ classes, scale, range }: Rose, k: number): string {
  return `rgb(${scaleColour(scale, range, classes[k]!.value)!.join(' ')})`;
}

/** The gap after this sector has the shortest neighbours. */
function thinnestGap(sectors: number, share: (sector: number) => number): number {
  let best = 0;
  let least = Infinity;
  for (let sector = 0; sector < sectors; sector++) {
    const near = share(sector) + share((sector + 1) % sectors);
    if (near < least) [best, least] = [sector, near];
  }
  return best;
}

function drawKey(pen: Pen, left: number, top: number, rose: Rose, look: Look): void {
  const { theme, ratio } = look;
  // Strongest on top, as it is outermost.
  rose.classes.forEach(({ words }, k) => {
    const y = top + (rose.classes.length - 1 - k + 0.5) * KEY_ROW * ratio;
    pen.fillStyle = colourOf(rose, k);
    pen.fillRect(left, y - 5 * ratio, 16 * ratio, 10 * ratio);
    writeText(pen, look, words, left + 24 * ratio, y, { size: 12, baseline: 'middle', colour: theme.soft });
  });
}
