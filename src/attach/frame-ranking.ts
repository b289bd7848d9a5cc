import type { Mat3 } from '#src/base/matrix3.ts';
import {
  addMatrices,
  frobeniusNorm,
  identity3,
  multiply,
  scaleMatrix,
  subtractMatrices,
  trace,
  transpose,
} from '#src/base/matrix3.ts';
import { isLeftHanded } from '#src/crystal/handedness.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { latticeSettings } from '#src/crystal/settings.ts';
import { anisotropicNorm } from '#src/tensor/parts.ts';
import { meanTensor, projectOnSiteSymmetry, rotateTensor, turnBack } from '#src/tensor/projection.ts';

/** What symmetry says of one frame beside the best one. */
export type FrameVerdict =
  'best' | 'same frame' | 'excluded' | 'within the noise' | 'undetectable by symmetry';

export interface RankedFrame {
  /** A named setting of the crystal's cell, or `given`: the one that the lattice beside the tensors makes. */
  readonly name: string;
  /** Between this frame and the one in use, degrees. */
  readonly rotationDegrees: number;
  /** √ of the mean over operations and atoms of ‖T[g(i)] − R T[i] Rᵀ‖², symmetric parts, unit of the tensors. */
  readonly residual: number;
  /** The same over the root mean square of the anisotropic parts; null where all tensors are isotropic. */
  readonly relative: number | null;
  readonly verdict: FrameVerdict;
}

/** How the Cartesian frame of a tensor set was settled. */
export interface FrameRanking {
  readonly frames: readonly RankedFrame[];
  /** True where a lattice or positions came with the tensors, the user chose, or symmetry excludes every frame but one. */
  readonly decided: boolean;
  readonly by: 'lattice' | 'positions' | 'user' | 'symmetry' | 'nothing';
  readonly inUse: string;
}

/** A tensor on an image of a site: T(image) = R T(site) Rᵀ. */
export interface TurnedTensor {
  readonly tensor: Mat3;
  readonly rotation: Mat3;
}

/** A site's tensors with the Cartesian matrices of the operations that keep it in place. */
export interface FramedSite {
  readonly tensors: readonly TurnedTensor[];
  readonly stabiliser: readonly Mat3[];
}

/** Residuals, as shares of the anisotropy: one frame is worse than another beyond twice its residual and this much more. */
const excludedBeyond = 0.01;
/** No setting fits that leaves more than this. */
const fittingShare = 0.1;
const invisibleShare = 1e-6;

interface FieldMisfit {
  readonly residual: number;
  readonly relative: number | null;
}

function symmetricPartOf(m: Mat3): Mat3 {
  return scaleMatrix(0.5, addMatrices(m, transpose(m)));
}

/** Each site's tensors in the frame, turned back on the site, and their mean made to obey its symmetry. */
function inFrame({ tensors, stabiliser }: FramedSite, frame: Mat3): { back: Mat3[]; clean: Mat3 } {
  const back = tensors.map(({ tensor, rotation }) =>
    turnBack(rotation, symmetricPartOf(rotateTensor(frame, tensor))),
  );
  return { back, clean: projectOnSiteSymmetry(meanTensor(back), stabiliser).projected };
}

/**
 * Residual of tensors turned by `frame` into the crystal's. Over a full orbit, the mean of ‖T[g(i)] − R T[i] Rᵀ‖² over all
 * operations and atoms is twice that of ‖Rᵢᵀ T[i] Rᵢ − P‖², P the projected mean; over a part of one it is taken to be.
 */
export function frameResidual(sites: readonly FramedSite[], frame: Mat3): FieldMisfit {
  let squares = 0;
  let anisotropy = 0;
  let count = 0;
  for (const site of sites) {
    if (site.tensors.length === 0) continue;
    const { back, clean } = inFrame(site, frame);
    for (const tensor of back) {
      squares += 2 * frobeniusNorm(subtractMatrices(tensor, clean)) ** 2;
      anisotropy += anisotropicNorm(tensor) ** 2;
      count += 1;
    }
  }
  const residual = Math.sqrt(squares / Math.max(1, count));
  const scale = Math.sqrt(anisotropy / Math.max(1, count));
  return { residual, relative: scale > 0 ? residual / scale : null };
}

/** The field without its noise, in the crystal's frame: what the best frame would be read from if nothing were uncertain. */
function cleanField(sites: readonly FramedSite[], frame: Mat3): FramedSite[] {
  return sites
    .filter(({ tensors }) => tensors.length > 0)
    .map((site) => {
      const { clean } = inFrame(site, frame);
      const tensors = site.tensors.map((one) => ({ ...one, tensor: rotateTensor(one.rotation, clean) }));
      return { ...site, tensors };
    });
}

export function rotationDegrees(rotation: Mat3): number {
  const cosine = (trace(rotation) - 1) / 2;
  const sine =
    Math.hypot(rotation[7] - rotation[5], rotation[2] - rotation[6], rotation[3] - rotation[1]) / 2;
  return (Math.atan2(sine, cosine) * 180) / Math.PI;
}

/** By name: the matrix that turns tensors given in a setting of the crystal's cell into the crystal's own frame. */
export function namedFrames(lattice: Lattice): { readonly name: string; readonly frame: Mat3 }[] {
  if (isLeftHanded(lattice)) return [];
  return latticeSettings.map(({ name }) => ({
    name,
    frame: multiply(lattice.toCartesian, latticeFromCell(lattice.cell, name).toFractional),
  }));
}

export interface FrameQuestion {
  /** Tensors as given, not yet turned. */
  readonly sites: readonly FramedSite[];
  readonly lattice: Lattice;
  /** What is known without symmetry: the matrix into the crystal's frame, and whence. */
  readonly known: {
    readonly frame: Mat3;
    readonly by: 'lattice' | 'positions' | 'user';
    readonly name: string;
  } | null;
}

/**
 * Ranks the named settings of the crystal's cell by how well the tensors, read in them, obey the symmetry of their sites and
 * each other (Nye, Physical Properties of Crystals, 1957). Where nothing else is known the best is taken; it is decided only
 * where every other frame is excluded. A rotation Q that commutes with what symmetry does to every tensor, as any does in P -1, those
 * about the unique axis of a monoclinic crystal, and those about the axes of axial sites, is undetectable.
 */
export function rankFrames({ sites, lattice, known }: FrameQuestion): {
  readonly ranking: FrameRanking;
  readonly frame: Mat3;
} {
  const named = namedFrames(lattice);
  const given = known && !named.some(({ name }) => name === known.name);
  const candidates = given ? [{ name: known.name, frame: known.frame }, ...named] : named;
  const scored = candidates
    .map((candidate, at) => ({ ...candidate, at, ...frameResidual(sites, candidate.frame) }))
    .sort((p, q) => Math.round((p.residual - q.residual) * 1e9) || p.at - q.at);
  const best = scored[0];
  if (!best) {
    const frame = known?.frame ?? identity3;
    const by = known?.by ?? 'nothing';
    return { frame, ranking: { frames: [], decided: known !== null, by, inUse: known?.name ?? '' } };
  }
  const clean = cleanField(sites, best.frame);
  const verdictOf = (one: (typeof scored)[number]): FrameVerdict => {
    if (one === best) return 'best';
    const between = multiply(one.frame, transpose(best.frame));
    if (rotationDegrees(between) < 0.01) return 'same frame';
    const share = one.relative ?? 0;
    if (share > 2 * (best.relative ?? 0) + excludedBeyond) return 'excluded';
    const visible = frameResidual(clean, between).relative ?? 0;
    return visible > invisibleShare ? 'within the noise' : 'undetectable by symmetry';
  };
  const judged = scored.map((one) => ({ ...one, verdict: verdictOf(one) }));
  const fits = (best.relative ?? 0) <= fittingShare;
  const symmetryDecides =
    fits &&
    judged.every(({ verdict }) => verdict === 'best' || verdict === 'same frame' || verdict === 'excluded');
  const chosen = known ?? { ...plainest(judged), by: symmetryDecides ? 'symmetry' : 'nothing' };
  return {
    frame: chosen.frame,
    ranking: {
      frames: judged.map(({ name, frame, residual, relative, verdict }) => ({
        name,
        rotationDegrees: rotationDegrees(multiply(frame, transpose(chosen.frame))),
        residual,
        relative,
        verdict,
      })),
      decided: known !== null || symmetryDecides,
      by: chosen.by as FrameRanking['by'],
      inUse: chosen.name,
    },
  };
}

/** Of the frames that symmetry does not exclude, the crystal's own where it is among them, else the best. */
function plainest<T extends { readonly verdict: FrameVerdict; readonly frame: Mat3 }>(
  judged: readonly T[],
): T {
  const open = judged.filter(({ verdict }) => verdict !== 'excluded');
  return open.find(({ frame }) => rotationDegrees(frame) < 0.01) ?? judged[0]!;
}
