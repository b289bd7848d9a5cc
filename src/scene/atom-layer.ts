import type { Mat3 } from '#src/base/matrix3.ts';
import { atomColour, atomRadius, bondColour } from './atom-style.ts';
import { legendColour } from './colour-scale.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import type { Legend, LabelAnchor, PickEntry, QuadricBatch, TensorScale } from './scene.ts';
import type { PrincipalForm, TensorShape } from './tensor-shape.ts';
import { tensorShape } from './tensor-shape.ts';

/** What the atoms' tensors are drawn with; null where no tensor is drawn. */
export interface TensorDrawing {
  /** By site index. */
  readonly forms: ReadonlyMap<number, PrincipalForm>;
  readonly scale: TensorScale;
  readonly legend: Legend;
}

/** Quadrics of all drawn atoms: tensor ellipsoids coloured by value, small spheres coloured by element. */
export function atomQuadrics(
  atoms: readonly DrawnAtom[],
  tensors: TensorDrawing | null,
): { readonly quadrics: QuadricBatch; readonly picks: readonly PickEntry[] } {
  const count = atoms.length;
  const quadrics = {
    count,
    centres: new Float32Array(3 * count),
    shapes: new Float32Array(9 * count),
    colours: new Uint8Array(3 * count),
    circles: new Uint8Array(count),
    pickIds: new Uint32Array(count),
  };
  const picks = atoms.map((drawn, i): PickEntry => {
    const form = drawn.context ? undefined : tensors?.forms.get(drawn.site.index);
    const { shape, circles } =
      form && tensors ? tensorShape(form, drawn.atom.rotation, tensors.scale) : sphere(drawn);
    quadrics.centres.set(drawn.position, 3 * i);
    quadrics.shapes.set(shape, 9 * i);
    quadrics.colours.set(
      form && tensors
        ? legendColour(tensors.legend, form.colourValue)
        : sphereColour(drawn, tensors !== null),
      3 * i,
    );
    quadrics.circles[i] = circles;
    quadrics.pickIds[i] = i + 1;
    const { atom, site, cellShift, context } = drawn;
    return { kind: 'atom', atomId: atom.id, siteIndex: site.index, cellShift, context };
  });
  return { quadrics, picks };
}

/** Neighbours outside are this much smaller, so that they stand back. */
const contextShare = 0.58;

function sphereColour({ site, context }: DrawnAtom, neutral: boolean): readonly [number, number, number] {
  return context ? bondColour(site.element, neutral) : atomColour(site.element);
}

function sphere({ site, context }: DrawnAtom): TensorShape {
  const r = atomRadius(site.element) * (context ? contextShare : 1);
  const shape: Mat3 = [r, 0, 0, 0, r, 0, 0, 0, r];
  return { shape, circles: 0 };
}

/** One label for each atom of the picture's own: its site's label. */
export function atomLabels(atoms: readonly DrawnAtom[], quadrics: QuadricBatch): LabelAnchor[] {
  return atoms.flatMap(({ site, position, context }, i) =>
    context ? [] : [{ text: site.label, position, pickId: quadrics.pickIds[i]!, quadric: i }],
  );
}
