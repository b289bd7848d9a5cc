import type { Viewport } from '#src/scene/camera.ts';
import { placeLabels } from '#src/scene/place-labels.ts';
import type { Expectation, PictureCase, Statement } from './picture-case.ts';
import type { PixelData } from './picture-pixels.ts';
import { PictureReader, luminance } from './picture-pixels.ts';
import type { PreparedPicture } from './picture-scene.ts';

type Of<K extends Statement['check']> = Extract<Statement, { check: K }>;
type Rgb = readonly [number, number, number];

/** What a check looks at. */
interface Seen {
  readonly reader: PictureReader;
  readonly prepared: PreparedPicture;
}

/** What of the expectations of a case is not true of its picture: sentences, each with the source of its number. */
export function failures(picture: PictureCase, prepared: PreparedPicture, pixels: PixelData): string[] {
  const seen = { reader: new PictureReader(pixels, picture, prepared.theme.paper), prepared };
  return picture.expect.flatMap((one) => {
    const found = failure(one, seen);
    return found === null ? [] : [`${one.check}: ${found} (${one.from})`];
  });
}

function failure(one: Expectation, seen: Seen): string | null {
  const check = checks[one.check] as (statement: Statement, seen: Seen) => string | null;
  return check(one, seen);
}

const checks: { readonly [K in Statement['check']]: (statement: Of<K>, seen: Seen) => string | null } = {
  outline: outlineCheck,
  centroid: centroidCheck,
  area({ at, aroundAngstrom, squareAngstrom, withinShare }, { reader }) {
    const count = reader.drawn(reader.square(at, aroundAngstrom)).length;
    return within('Å²', count / reader.pixelsPerAngstrom ** 2, squareAngstrom, withinShare * squareAngstrom);
  },
  colour({ at, rgb, within: most }, { reader }) {
    const found = reader.colourAt(at);
    return found.every((byte, k) => Math.abs(byte - rgb[k]!) <= most) ? null : `${found} for ${rgb}`;
  },
  hue({ at, is }, { reader }) {
    const [red, , blue] = reader.colourAt(at);
    return (is === 'warm' ? red - blue : blue - red) > 15 ? null : `red ${red}, blue ${blue} for ${is}`;
  },
  drawn({ at }, { reader }) {
    const missing = at.filter((place) => !reader.isDrawnAt(place));
    return missing.length === 0 ? null : `nothing at ${missing.join(' and ')}`;
  },
  paper({ at }, { reader }) {
    const covered = at.filter((place) => reader.isDrawnAt(place));
    return covered.length === 0 ? null : `something at ${covered.join(' and ')}`;
  },
  pieces({ count }, { reader }) {
    const found = piecesOf(reader);
    return found === count ? null : `${found} for ${count}`;
  },
  stretches({ line, atLeast, atMost }, { reader }) {
    const drawn = reader.line(line).map(([x, y]) => reader.isDrawn(x, y));
    return counted(drawn.filter((is, k) => is && !drawn[k - 1]).length, atLeast, atMost);
  },
  bands({ line, atLeast, atMost }, { reader }) {
    const lights = reader.line(line).map(([x, y]) => luminance(reader.colour(x, y)));
    return counted(turnsOf(lights), atLeast, atMost);
  },
  share: shareCheck,
  darkest({ at, aroundAngstrom, least, most }, { reader }) {
    const lights = reader
      .drawn(reader.square(at, aroundAngstrom))
      .map(([x, y]) => luminance(reader.colour(x, y)));
    const share = Math.min(...lights) / luminance(reader.colourAt(at));
    return between('of the luminance', share, least, most);
  },
  contrast({ at, least }, { reader }) {
    const [own, paper] = [luminance(reader.colourAt(at)), luminance(reader.paper)];
    const contrast = (Math.max(own, paper) + 0.05) / (Math.min(own, paper) + 0.05);
    return contrast >= least ? null : `${contrast.toFixed(2)}:1 for ${least}:1`;
  },
  luminance({ at, least, most }, { reader }) {
    return between('luminance', luminance(reader.colourAt(at)), least, most);
  },
  opacity({ at, alpha }, { reader }) {
    const found = reader.alpha(...reader.place(at));
    return found === alpha ? null : `${found} for ${alpha}`;
  },
  labels: labelsCheck,
  caption({ has = [], lacks = [] }, { prepared }) {
    const { caption } = prepared.scene;
    const wrong = [...has.filter((t) => !caption.includes(t)), ...lacks.filter((t) => caption.includes(t))];
    return wrong.length === 0 ? null : `“${wrong.join('”, “')}” against “${caption}”`;
  },
  legend({ is }, { prepared }) {
    const { legend } = prepared.scene;
    if (is === null || legend === null) return is === legend ? null : `${legend?.title ?? 'none'}`;
    const wrong = Object.entries(is).filter(([key, value]) => legend[key as keyof typeof legend] !== value);
    return wrong.length === 0
      ? null
      : `${JSON.stringify({ ...legend, stops: [] })} for ${JSON.stringify(is)}`;
  },
  scale({ statement }, { prepared }) {
    const found = prepared.scene.scaleStatement;
    return found === statement ? null : `${found} for ${statement}`;
  },
};

function within(unit: string, found: number, expected: number, most: number): string | null {
  return Math.abs(found - expected) <= most ? null : `${found.toFixed(3)} ${unit} for ${expected} ± ${most}`;
}

function between(what: string, found: number, least: number, most: number): string | null {
  return found >= least && found <= most ? null : `${found.toFixed(3)} ${what} for ${least} to ${most}`;
}

function counted(found: number, atLeast: number, atMost: number): string | null {
  return found >= atLeast && found <= atMost ? null : `${found} for ${atLeast} to ${atMost}`;
}

function outlineCheck(
  { at, halfAngstrom, aroundAngstrom, withinPx = 1.1 }: Of<'outline'>,
  { reader }: Seen,
): string | null {
  const drawn = reader.drawn(reader.square(at, aroundAngstrom));
  if (drawn.length === 0) return 'nothing is drawn';
  const [x, y] = reader.place(at);
  const [across, upwards] = halfAngstrom.map((half) => half * reader.pixelsPerAngstrom) as [number, number];
  const columns = drawn.map(([column]) => column);
  const rows = drawn.map(([, row]) => row);
  const found = [least(columns), most(columns) + 1, least(rows), most(rows) + 1];
  const expected = [x - across, x + across, y - upwards, y + upwards];
  const isRight = found.every((value, k) => Math.abs(value - expected[k]!) <= withinPx);
  return isRight ? null : `${found.join(', ')} px for ${expected.map((e) => e.toFixed(1)).join(', ')} px`;
}

function least(values: readonly number[]): number {
  return values.reduce((one, other) => Math.min(one, other), Infinity);
}

function most(values: readonly number[]): number {
  return values.reduce((one, other) => Math.max(one, other), -Infinity);
}

function centroidCheck(
  { at, aroundAngstrom, withinPx = 0.75 }: Of<'centroid'>,
  { reader }: Seen,
): string | null {
  const drawn = reader.drawn(reader.square(at, aroundAngstrom));
  if (drawn.length === 0) return 'nothing is drawn';
  const mean = ([0, 1] as const).map((k) => drawn.reduce((sum, p) => sum + p[k] + 0.5, 0) / drawn.length);
  const [x, y] = reader.place(at);
  const apart = Math.hypot(mean[0]! - x, mean[1]! - y);
  return apart <= withinPx ? null : `${apart.toFixed(2)} px away`;
}

/** Pieces of at least four pixels that hang together by their sides. */
function piecesOf(reader: PictureReader): number {
  const { widthPx: width, heightPx: height } = reader;
  const left = new Set(
    reader.drawn({ left: 0, top: 0, right: width, bottom: height }).map(([x, y]) => y * width + x),
  );
  let pieces = 0;
  for (const start of left) {
    const open = [start];
    left.delete(start);
    for (const here of open) {
      const column = here % width;
      const sides = [here - width, here + width];
      if (column > 0) sides.push(here - 1);
      if (column < width - 1) sides.push(here + 1);
      for (const next of sides) if (left.delete(next)) open.push(next);
    }
    if (open.length >= 4) pieces += 1;
  }
  return pieces;
}

/** A turn is a change by more than this share of the lighter side. */
const turnShare = 0.14;

/** Turns from lighter to darker and back. */
function turnsOf(lights: readonly number[]): number {
  let [extreme, isRising, turns] = [0, true, 0];
  for (const light of lights) {
    if (isRising ? light >= extreme : light <= extreme) {
      extreme = light;
    } else if (Math.abs(light - extreme) > turnShare * Math.max(light, extreme)) {
      [extreme, isRising, turns] = [light, !isRising, turns + 1];
    }
  }
  return turns;
}

function shareCheck(
  { at, aroundAngstrom, among, share, within: tolerance }: Of<'share'>,
  { reader }: Seen,
): string | null {
  const drawn = reader.drawn(reader.square(at, aroundAngstrom));
  const first = drawn.filter(([x, y]) => {
    const own = hueOf(reader.colour(x, y));
    const distances = among.map((rgb) => Math.hypot(...hueOf(rgb).map((part, k) => part - own[k]!)));
    return distances[0] === Math.min(...distances);
  });
  return within('of the area', first.length / drawn.length, share, tolerance);
}

/** Shares of red, green and blue in linear light: the same however much light falls on a surface. */
function hueOf(colour: Rgb): Rgb {
  const [r, g, b] = colour.map((byte) => (byte / 255) ** 2.2) as [number, number, number];
  const sum = r + g + b || 1;
  return [r / sum, g / sum, b / sum];
}

function labelsCheck({ texts }: Of<'labels'>, { reader, prepared }: Seen): string | null {
  const viewport: Viewport = { widthPx: reader.widthPx, heightPx: reader.heightPx };
  const placed = placeLabels(prepared.scene, prepared.camera, viewport, (text) => ({
    widthPx: 7 * text.length,
    heightPx: 13,
  }));
  const found = placed.map(({ text }) => text).sort();
  if (found.join('|') !== [...texts].sort().join('|')) return `${found.join(', ')} for ${texts.join(', ')}`;
  const outside = placed.find(
    ({ leftPx, topPx, widthPx, heightPx }) =>
      leftPx < 0 || topPx < 0 || leftPx + widthPx > reader.widthPx || topPx + heightPx > reader.heightPx,
  );
  if (outside) return `${outside.text} reaches out of the picture`;
  for (const [k, one] of placed.entries()) {
    for (const other of placed.slice(k + 1)) {
      const apart =
        one.leftPx + one.widthPx <= other.leftPx ||
        other.leftPx + other.widthPx <= one.leftPx ||
        one.topPx + one.heightPx <= other.topPx ||
        other.topPx + other.heightPx <= one.topPx;
      if (!apart) return `${one.text} and ${other.text} overlap`;
    }
  }
  return null;
}
