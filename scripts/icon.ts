// Draws the extension's icon: a flask with a coral branch in it. One list of shapes becomes the SVG and the PNG.
import { writeFile } from "node:fs/promises";
import { crc32, deflateSync } from "node:zlib";

const size = 256;

type Color = readonly [red: number, green: number, blue: number];
const ground: Color = [16, 66, 82];
const glass: Color = [226, 240, 242];
const water: Color = [58, 134, 150];
const coral: Color = [255, 138, 101];

type Point = readonly [x: number, y: number];

/** Lines with round ends, polygons, and the rounded square behind all. */
type Shape =
  | { readonly kind: "square"; readonly radius: number; readonly color: Color }
  | { readonly kind: "polygon"; readonly points: readonly Point[]; readonly color: Color }
  | {
      readonly kind: "line";
      readonly points: readonly Point[];
      readonly width: number;
      readonly color: Color;
    };

/** Drawn one over the other. */
const shapes: readonly Shape[] = [
  { kind: "square", radius: 44, color: ground },
  {
    kind: "polygon",
    points: [
      [79, 146],
      [177, 146],
      [208, 208],
      [48, 208],
    ],
    color: water,
  },
  {
    kind: "line",
    points: [
      [128, 204],
      [128, 132],
    ],
    width: 16,
    color: coral,
  },
  {
    kind: "line",
    points: [
      [128, 184],
      [94, 162],
      [92, 138],
    ],
    width: 13,
    color: coral,
  },
  {
    kind: "line",
    points: [
      [128, 168],
      [160, 150],
      [160, 128],
    ],
    width: 13,
    color: coral,
  },
  {
    kind: "line",
    points: [
      [128, 140],
      [114, 116],
    ],
    width: 11,
    color: coral,
  },
  {
    kind: "line",
    points: [
      [128, 140],
      [139, 108],
    ],
    width: 11,
    color: coral,
  },
  {
    kind: "line",
    points: [
      [102, 44],
      [102, 100],
      [48, 208],
      [208, 208],
      [154, 100],
      [154, 44],
    ],
    width: 12,
    color: glass,
  },
  {
    kind: "line",
    points: [
      [90, 44],
      [166, 44],
    ],
    width: 12,
    color: glass,
  },
];

/** How far outside a shape a point lies; less than 0 inside. */
function distance(shape: Shape, [x, y]: Point): number {
  if (shape.kind === "square") {
    const half = size / 2 - shape.radius;
    const outside = [Math.abs(x - size / 2) - half, Math.abs(y - size / 2) - half] as const;
    const corner = Math.hypot(Math.max(outside[0], 0), Math.max(outside[1], 0));
    return corner + Math.min(Math.max(...outside), 0) - shape.radius;
  }
  const { points } = shape;
  if (shape.kind === "line")
    return Math.min(...sides(points).map((side) => toSide(side, [x, y]))) - shape.width / 2;
  const around = sides([...points, points[0]!]);
  const nearest = Math.min(...around.map((side) => toSide(side, [x, y])));
  const crossings = around.filter(
    ([[ax, ay], [bx, by]]) => ay > y !== by > y && x < ax + ((y - ay) / (by - ay)) * (bx - ax),
  );
  return crossings.length % 2 === 1 ? -nearest : nearest;
}

type Side = readonly [Point, Point];

const sides = (points: readonly Point[]): Side[] =>
  points.slice(1).map((point, index) => [points[index]!, point] as const);

function toSide([[ax, ay], [bx, by]]: Side, [x, y]: Point): number {
  const [dx, dy] = [bx - ax, by - ay];
  const along = Math.min(Math.max(((x - ax) * dx + (y - ay) * dy) / (dx * dx + dy * dy), 0), 1);
  return Math.hypot(x - ax - along * dx, y - ay - along * dy);
}

/** Red, green, blue, opacity of each pixel, with smooth edges. */
function pixels(): Buffer {
  const rows: Buffer[] = [];
  for (let row = 0; row < size; row += 1) {
    // Each row begins with the number of its filter: none.
    const bytes = Buffer.alloc(1 + size * 4);
    for (let column = 0; column < size; column += 1) {
      let [red, green, blue, opacity] = [0, 0, 0, 0];
      for (const shape of shapes) {
        const cover = Math.min(Math.max(0.5 - distance(shape, [column + 0.5, row + 0.5]), 0), 1);
        const mix = (under: number, over: number) => under + (over - under) * cover;
        if (opacity === 0) [red, green, blue] = shape.color;
        [red, green, blue] = [
          mix(red, shape.color[0]),
          mix(green, shape.color[1]),
          mix(blue, shape.color[2]),
        ];
        opacity = Math.max(opacity, cover);
      }
      bytes.set([red, green, blue, opacity * 255].map(Math.round), 1 + column * 4);
    }
    rows.push(bytes);
  }
  return Buffer.concat(rows);
}

function chunk(type: string, data: Buffer): Buffer {
  const body = Buffer.concat([Buffer.from(type, "ascii"), data]);
  const head = Buffer.alloc(4);
  head.writeUInt32BE(data.length);
  const check = Buffer.alloc(4);
  check.writeUInt32BE(crc32(body));
  return Buffer.concat([head, body, check]);
}

/** Portable Network Graphics, second edition (W3C 2003): 8 bits a channel, with opacity. */
export function png(): Buffer {
  const header = Buffer.alloc(13);
  header.writeUInt32BE(size, 0);
  header.writeUInt32BE(size, 4);
  header.set([8, 6, 0, 0, 0], 8);
  return Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    chunk("IHDR", header),
    chunk("IDAT", deflateSync(pixels(), { level: 9 })),
    chunk("IEND", Buffer.alloc(0)),
  ]);
}

const hex = (color: Color): string => `#${color.map((part) => part.toString(16).padStart(2, "0")).join("")}`;
const listed = (points: readonly Point[]): string => points.map((point) => point.join(",")).join(" ");

function drawn(shape: Shape): string {
  if (shape.kind === "square")
    return `<rect width="${size}" height="${size}" rx="${shape.radius}" fill="${hex(shape.color)}"/>`;
  if (shape.kind === "polygon")
    return `<polygon points="${listed(shape.points)}" fill="${hex(shape.color)}"/>`;
  return `<polyline points="${listed(shape.points)}" fill="none" stroke="${hex(shape.color)}" stroke-width="${shape.width}" stroke-linecap="round" stroke-linejoin="round"/>`;
}

export const svg = (): string =>
  `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${size} ${size}">\n  <title>Marl</title>\n${shapes.map((shape) => `  ${drawn(shape)}\n`).join("")}</svg>\n`;

export const iconFiles = { png: "client/media/icon.png", svg: "client/media/marl.svg" } as const;

export async function main(): Promise<void> {
  await writeFile(iconFiles.png, png());
  await writeFile(iconFiles.svg, svg());
  console.log(Object.values(iconFiles).join("\n"));
}
