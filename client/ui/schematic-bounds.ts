import type { Drawing, DrawingItem } from '../../server/contracts/drawing.ts';

interface Box {
  left: number;
  top: number;
  right: number;
  bottom: number;
}

const labelSize = 15;
/** Mean advance of a letter as a share of its size, a little generous. */
const advance = 0.6;

function boxOf(item: DrawingItem): Box {
  const around = (points: readonly (readonly [number, number])[], margin: number): Box => ({
    left: Math.min(...points.map(([x]) => x)) - margin,
    right: Math.max(...points.map(([x]) => x)) + margin,
    top: Math.min(...points.map(([, y]) => y)) - margin,
    bottom: Math.max(...points.map(([, y]) => y)) + margin,
  });
  switch (item.kind) {
    case 'wire':
      return around(item.points, 0);
    case 'dot':
      return around([item.at], 4);
    case 'ground':
      return around([item.at], 17);
    case 'part':
      return around([item.from, item.to], 15);
    case 'comparator': {
      const [x, y] = item.at;
      return around(
        [
          [x, y - item.height / 2],
          [x + item.width, y + item.height / 2],
        ],
        0,
      );
    }
    case 'label': {
      const width = item.text.length * labelSize * advance;
      const [x, y] = item.at;
      const left = { start: x, middle: x - width / 2, end: x - width }[item.anchor];
      return { left, right: left + width, top: y - labelSize, bottom: y + 5 };
    }
  }
}

/** The viewBox that holds all of a drawing, its lettering too, with a little paper around. */
export function viewBoxOf(drawing: Drawing): string {
  const boxes = drawing.items.map((item) => boxOf(item));
  if (boxes.length === 0) return `0 0 ${drawing.width} ${drawing.height}`;
  const paper = 10;
  const left = Math.min(...boxes.map((box) => box.left)) - paper;
  const top = Math.min(...boxes.map((box) => box.top)) - paper;
  const right = Math.max(...boxes.map((box) => box.right)) + paper;
  const bottom = Math.max(...boxes.map((box) => box.bottom)) + paper;
  return [left, top, right - left, bottom - top].map((value) => value.toFixed(1)).join(' ');
}
