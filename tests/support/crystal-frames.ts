import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { asMat3, transpose } from '#src/base/matrix3.ts';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';

/** One published structure with a made-up field of tensors that obeys its space group, in setting S1. */
export interface FramedStructure {
  readonly name: string;
  readonly reference: string;
  readonly spaceGroup: number;
  readonly operations: number;
  readonly rowsS1: Mat3;
  readonly atoms: readonly {
    readonly label: string;
    readonly element: string;
    readonly fractional: Vec3;
    readonly tensor: Mat3;
  }[];
  readonly sites: readonly {
    readonly label: string;
    readonly multiplicity: number;
    readonly order: number;
    readonly symbol: string;
  }[];
}

interface Facts {
  readonly structures: readonly {
    readonly name: string;
    readonly reference: string;
    readonly space_group: number;
    readonly operations: readonly unknown[];
    readonly lattice_columns: { readonly S1: number[][] };
    readonly field: readonly {
      readonly label: string;
      readonly frac: Vec3;
      readonly tensor_S1: number[][];
    }[];
    readonly sites: readonly {
      readonly label: string;
      readonly element: string;
      readonly multiplicity: number;
      readonly site_symmetry: string;
      readonly site_symmetry_order: number;
    }[];
  }[];
}

const path = fileURLToPath(new URL('../outside/facts/crystal-frames.json', import.meta.url));

/** The structures of tests/outside/facts/crystal-frames.json (sources there). */
export function framedStructures(): FramedStructure[] {
  const facts = JSON.parse(readFileSync(path, 'utf8')) as Facts;
  return facts.structures.map((structure) => {
    const elements = new Map(structure.sites.map(({ label, element }) => [label, element]));
    return {
      name: structure.name,
      reference: structure.reference,
      spaceGroup: structure.space_group,
      operations: structure.operations.length,
      rowsS1: transpose(asMat3(structure.lattice_columns.S1.flat())),
      atoms: structure.field.map(({ label, frac, tensor_S1 }) => ({
        label,
        element: elements.get(label) ?? label,
        fractional: frac,
        tensor: asMat3(tensor_S1.flat()),
      })),
      sites: structure.sites.map((site) => ({
        label: site.label,
        multiplicity: site.multiplicity,
        order: site.site_symmetry_order,
        symbol: site.site_symmetry,
      })),
    };
  });
}
