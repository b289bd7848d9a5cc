/**
 * The parameter block at the start of the kernel's memory: four bytes a slot, numbered here for the host, the plain
 * JavaScript kernel and the AssemblyScript one alike. "At" slots hold byte addresses. Lengths are in samples (pixels
 * times the samples across one); columns run to the right, rows downwards.
 */
export const blockBytes = 512;

// whole numbers
export const quadricCount = 0;
export const cylinderCount = 1;
export const lineCount = 2;
/** Columns and rows of the picture, and of them the rows this kernel draws. */
export const columns = 3;
export const rows = 4;
export const firstRow = 5;
export const endRow = 6;
/** Samples in one row of the strip's buffers: columns and some room for the last step of four. */
export const stride = 7;
export const samplesAcross = 8;
export const markedCount = 9;
/** 1 where ids and depths are wanted. */
export const wantsIds = 10;
/** Objects that reach into the rows, after sorting. */
export const visibleCount = 11;
export const paperPixel = 12;
export const selectedPixel = 13;
export const hoveredPixel = 14;
/** Samples in one row of the colours. */
export const colourStride = 15;
export const polarCount = 16;
export const facetCount = 17;
/** Of what is in the pool: polar surfaces with another number in their record have no patch there. */
export const polarEpoch = 18;
/** Address of what is free in the pool. */
export const polarFree = 19;

// addresses
export const centresAt = 20;
export const shapesAt = 21;
export const circlesAt = 22;
export const statesAt = 23;
export const quadricTintsAt = 24;
export const startsAt = 25;
export const endsAt = 26;
export const radiiAt = 27;
export const startTintsAt = 28;
export const endTintsAt = 29;
export const lineStartsAt = 30;
export const lineEndsAt = 31;
export const markedAt = 32;
export const recordsAt = 33;
export const candidatesAt = 34;
export const sortedAt = 35;
export const binsAt = 36;
export const depthAt = 37;
export const idsAt = 38;
export const coloursAt = 39;
export const tilesAt = 40;
export const pixelsAt = 41;
export const linearTableAt = 42;
export const bytesTableAt = 43;
export const outIdsAt = 44;
export const outDepthAt = 45;
/** Bytes, one a quadric: share of its own colour, pattern; and tints of the rest. 0 where no quadric has such. */
export const sharesAt = 46;
export const patternsAt = 47;
export const restTintsAt = 48;
export const polarCentresAt = 49;
export const polarTensorsAt = 50;
export const positiveTintsAt = 51;
export const negativeTintsAt = 52;
/** One word a polar surface: level of its mesh, -1 where it isn't drawn. */
export const polarMeshesAt = 53;
/** Four words a level: address and count of directions (half of them, without the opposite ones), address and count of triangles. */
export const meshTableAt = 54;
/** Facets from back to front, `facetSize` floats each. */
export const facetsAt = 55;
/** Cosine and sine of 2π·k/255 for k from 0 to 255. */
export const circleTableAt = 56;
/** Room for the patches of polar surfaces, and its end. */
export const polarPoolAt = 57;
export const polarPoolEnd = 58;
/** One a quadric: largest distance of its surface from the centre at most, Å. */
export const reachesAt = 59;

// floats
/** Nine: crystal to view axes, row-major, times samples per Å. */
export const turn = 60;
/** Three, Å. */
export const target = 69;
/** Column and row of the point that the camera looks at: 0.5 less than its place, so that sample centres are whole. */
export const middleColumn = 72;
export const middleRow = 73;
export const samplesPerAngstrom = 74;
/** Samples in one CSS pixel. */
export const pixelScale = 75;
export const nearest = 76;
/** 1 / (nearest − farthest depth of the scene). */
export const perDepth = 77;
export const depthCue = 78;
/** Three each: sRGB from 0 to 255. */
export const paper = 79;
export const lineColour = 82;
/** CSS pixels. */
export const lineWidth = 85;
export const circleWidth = 86;
export const rimWidth = 87;
export const ringInner = 88;
export const ringOuter = 89;
/** 1 / (samples from the target to the eye); 0 without perspective. See src/scene/perspective.ts. */
export const perEye = 90;
/** As RimLine of src/scene/light.ts; `…Per` is 1 / (full − from). */
export const rimInk = 91;
export const rimFrom = 92;
export const rimPer = 93;
export const cylinderRimInk = 94;
export const cylinderRimFrom = 95;
export const cylinderRimPer = 96;
export const cylinderRimWidth = 97;
/** As leastNearness of src/scene/perspective.ts. */
export const leastNearness = 98;
/** An address: one a polar surface, its largest radius, Å. */
export const polarReachesAt = 99;
/** An address: projected vertices of one polar surface. */
export const polarVerticesAt = 100;
/** An address: as QuadricBatch.ringRadii; 0 where all are -1. */
export const ringRadiiAt = 101;

// sizes of what the addresses lead to, in units of four bytes
export const recordSize = 48;
/** Nine numbers, and 1 where lines on the colour are drawn in light. */
export const tintSize = 10;
/** Of a polar surface's vertices: column, row, depth, signed radius. */
export const vertexSize = 4;
/** Samples of a polar surface's patch, unless sixteen rows have more. */
export const mostPatchSamples = 1_048_576;
/** Of facets: column, row and depth of three corners, sRGB from 0 to 255, opacity. */
export const facetSize = 13;
export const meshSize = 4;
/** Of candidates and sorted objects: object, first and last row, first and last column, nearest depth (a float). */
export const entrySize = 6;
export const binCount = 4096;
/** Rows of a strip at most, and sides of the tiles that skip what is hidden. */
export const stripRows = 32;
export const tileSide = 16;
/** Of a tile: farthest depth in it, objects drawn since that was found. */
export const tileSize = 2;
/** Objects drawn into a tile before its farthest depth is looked for again. */
export const tilePatience = 2;

/** Depths of nothing drawn yet, and of the room beside the picture, where nothing may be drawn. */
export const nothingDepth: number = -1e30;
export const closedDepth: number = 1e30;

// A quadric's record, in units of four bytes. Both kinds: 10 and 11.
/** Column and row of the centre (less 0.5 each), depth of the centre. */
export const qColumn = 0;
export const qRow = 1;
export const qDepth = 2;
/** K = Σxy⁻¹ */
export const qKxx = 3;
export const qKxy = 4;
export const qKyy = 5;
/** Slopes of the contour plane, half depth. */
export const qSlopeX = 6;
export const qSlopeY = 7;
export const qHalfDepth = 8;
/** Half the outline's width at the centre's row; shift of a row's middle with its height; 1 / Σyy. */
export const qHalfWidth = 9;
export const oNearest = 11;
/** Half width of the outline's box. */
export const oReach = 10;
/** Middle row of the box and half its rows. */
export const oBoxRow = 43;
export const oBoxHalf = 44;
export const qShear = 12;
export const qPerYy = 13;
/** Half the outline's smallest width, CSS pixels. */
export const qNarrowest = 14;
/** 1 where what follows was filled for this frame. */
export const oShaded = 15;
/** Three circles: x, y and z coefficients of u_k in offset and unit height. */
export const qCircles = 16;
export const qCircleLow = 25;
export const qCirclePer = 26;
export const qCircleInk = 27;
export const qRimInk = 28;
/** Beyond this rest = 1 − e² no rim is near. */
export const qRimRest = 29;
export const qBits = 30;
export const qIsDark = 31;
/** Square of the distance beyond which a circle's line ends. */
export const qCircleHighSquare = 32;
/** Constant terms of the three u_k, which perspective brings. */
export const qCircleBias = 33;
/** Cosine and sine of the angle where the own colour ends; 1 where that is less than half a turn. */
export const qShareCos = 36;
export const qShareSin = 37;
export const qIsNarrowShare = 38;
/** 1 where all is of the own colour. */
export const qIsWhole = 39;
/** Pattern's number, and the share of its ink. */
export const qPattern = 40;
export const qPatternInk = 41;
export const qRestIsDark = 42;

// A cylinder's record.
export const cColumn = 0;
export const cRow = 1;
export const cDepth = 2;
/** Direction of the projected axis, y up. */
export const cAlongX = 3;
export const cAlongY = 4;
export const cRadius = 5;
export const cSize = 6;
export const cLie = 7;
export const cRise = 8;
export const cMiddle = 9;
export const cLow = 12;
export const cHigh = 13;
export const cPerLie = 14;
export const cBias = 16;
export const cPerRise = 17;
export const cCapBias = 18;
export const cCapAt = 19;
export const cRimInk = 20;
export const cRimLow = 21;
export const cRimPer = 22;
export const cFacing = 23;

// In perspective a cylinder's 0, 1, 3, 4, 5, 9, 12 and 13 bound its image, and the following describe it, in view axes.
/** Column and row of the image of its start. */
export const pColumn = 24;
export const pRow = 25;
/** Direction of the axis. */
export const pAxis = 26;
/** From the start to the eye. */
export const pToEye = 29;
/** Components of (start to eye) × axis over the eye's distance. */
export const pMomentX = 32;
export const pMomentY = 33;
/** The eye's place along the axis. */
export const pEyeAlong = 34;
export const pSize = 35;
export const pRadius = 36;

// A polar surface's record; 9 is cMiddle.
export const sColumn = 0;
export const sRow = 1;
export const sDepth = 2;
/** T in view axes, samples: xx, yy, zz, xy, xz, yz. */
export const sTensor = 3;
/** Centre in view axes, samples. */
export const sCentre = 12;
/** Bands in one sample, their ink, the rim's ink. */
export const sBands = 20;
export const sBandInk = 16;
export const sRimInk = 17;
export const sIsDark = 18;
export const sNegativeIsDark = 19;
/** Words: address of its patch in the pool and the pool's epoch then; columns and rows of the patch; last row that needs no other. */
export const sPatch = 21;
export const sEpoch = 22;
export const sLeft = 23;
export const sTop = 24;
export const sRight = 25;
export const sBottom = 26;
export const sUntil = 27;
