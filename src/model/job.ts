// Owns the types of the job document (as written by a person) and of the resolved job (numbers in SI units).
// Must not know the DOM, React, stores, Node, or how fields are computed.

/**
 * A number with its unit as a person writes it: "22.86 mm", "0.9 in", "8.2 GHz", "60 dB", "30 deg", or an expression
 * over named values: "a/2 + 1 mm". Parsed by `base/quantity`.
 */
export type Quantity = string;

/** x to the right, y up, measured from the origin of the sheet. */
export type Point = readonly [x: Quantity, y: Quantity];

/** Which field points out of the plane of the section. */
export type Section = 'E out of plane' | 'H out of plane';

export type EdgeName = 'left' | 'right' | 'bottom' | 'top';
export type EdgeKind = 'absorbing' | 'metal' | 'magnetic' | 'repeating';

interface PartBase {
  readonly id: string;
  readonly name: string;
  /** Id of a library entry or of one of the job's own materials. */
  readonly material: string;
  /** True when the reference run is made without this part. */
  readonly leftOutOfReference: boolean;
}
export interface WallPart extends PartBase {
  readonly kind: 'wall';
  /** Centre line, at least two points; ends are cut square, corners mitred. */
  readonly points: readonly Point[];
  readonly thickness: Quantity;
}
export interface RectanglePart extends PartBase {
  readonly kind: 'rectangle';
  readonly from: Point;
  readonly to: Point;
}
export interface DiscPart extends PartBase {
  readonly kind: 'disc';
  readonly centre: Point;
  readonly radius: Quantity;
}
export interface RingPart extends PartBase {
  readonly kind: 'ring';
  readonly centre: Point;
  readonly inner: Quantity;
  readonly outer: Quantity;
  /** Counter-clockwise from `from` to `to`; 0 deg to 360 deg is a whole ring. */
  readonly from: Quantity;
  readonly to: Quantity;
}
export interface PolygonPart extends PartBase {
  readonly kind: 'polygon';
  readonly points: readonly Point[];
}
export interface StrokePart extends PartBase {
  readonly kind: 'stroke';
  /** Freehand path painted with a round brush. */
  readonly points: readonly Point[];
  readonly width: Quantity;
}
export type Part = WallPart | RectanglePart | DiscPart | RingPart | PolygonPart | StrokePart;
export type PartKind = Part['kind'];

export type Waveform =
  | { readonly kind: 'band pulse' }
  | { readonly kind: 'continuous wave'; readonly frequency: Quantity }
  | { readonly kind: 'damped step'; readonly rise: Quantity; readonly decay: Quantity }
  /** Relative amplitude against time in seconds, times rising from 0; joined by straight lines, zero after the end. */
  | { readonly kind: 'samples'; readonly name: string; readonly times: readonly number[]; readonly values: readonly number[] };

export interface PlaneWaveDrive {
  readonly id: string;
  readonly name: string;
  readonly kind: 'plane wave';
  /** Peak electric field, V/m. */
  readonly amplitude: Quantity;
  /** Direction of travel, counter-clockwise from +x. */
  readonly angle: Quantity;
  readonly waveform: Waveform;
}
export interface LineCurrentDrive {
  readonly id: string;
  readonly name: string;
  readonly kind: 'line current';
  readonly at: Point;
  /** Peak current out of the plane: electric in A when E is out of the plane, magnetic in V when H is. */
  readonly amplitude: Quantity;
  readonly waveform: Waveform;
}
export type Drive = PlaneWaveDrive | LineCurrentDrive;

export interface Probe {
  readonly id: string;
  readonly name: string;
  readonly at: Point;
}

export interface OwnMaterial {
  readonly id: string;
  readonly name: string;
  readonly permittivity: number;
  readonly permeability: number;
  /** S/m */
  readonly conductivity: number;
  /** Magnetic loss sigma*, ohm/m */
  readonly magneticLoss: number;
}

export interface Job {
  /** Version of the document. */
  readonly guidewall: 1;
  readonly title: string;
  readonly notes: string;
  readonly section: Section;
  readonly band: {
    readonly from: Quantity;
    readonly to: Quantity;
    /** Number of frequencies from `from` to `to`, evenly spaced, both ends included: 2 to 20001. */
    readonly points: number;
    /** Spot frequencies of special interest; reported besides the even ones. */
    readonly listed: readonly Quantity[];
  };
  readonly sheet: {
    readonly width: Quantity;
    readonly height: Quantity;
    /** Where the origin of coordinates stands, measured from the lower left corner. */
    readonly origin: Point;
    readonly background: string;
    readonly edges: Readonly<Record<EdgeName, EdgeKind>>;
  };
  readonly grid: {
    readonly cells: { readonly perWavelength: number } | { readonly x: Quantity; readonly y: Quantity };
    /** Depth of an absorbing edge in cells. */
    readonly absorberCells: number;
    /** Fraction of the largest stable time step, 0.1 to 0.99. */
    readonly courant: number;
  };
  readonly values: Readonly<Record<string, Quantity>>;
  readonly materials: readonly OwnMaterial[];
  /** Painted in order, the later one on top. */
  readonly parts: readonly Part[];
  readonly drives: readonly Drive[];
  readonly probes: readonly Probe[];
  readonly reference: 'without marked parts' | 'empty sheet' | 'none';
  readonly stop: {
    /** Stop when the energy on the sheet has fallen this far below its peak ("60 dB"), or "never". */
    readonly decay: Quantity;
    /** Longest time simulated. With decay "never" this fixes the record's length. */
    readonly after: Quantity;
  };
}

/** Constants of a medium as the time stepper takes them. Metal ignores the numbers. */
export interface Medium {
  readonly metal: boolean;
  readonly epsilonRelative: number;
  readonly muRelative: number;
  /** S/m */
  readonly sigma: number;
  /** ohm/m */
  readonly sigmaMagnetic: number;
}

/** Metres, in sheet coordinates (origin applied by the job: 0,0 is the user's origin). */
export type XY = readonly [x: number, y: number];

/** A closed outline: rings of points in metres; outer rings counter-clockwise, holes clockwise; even-odd and nonzero agree. */
export type Outline = readonly (readonly XY[])[];

export interface ResolvedPart {
  readonly id: string;
  readonly name: string;
  readonly kind: PartKind;
  readonly materialId: string;
  readonly medium: Medium;
  readonly leftOutOfReference: boolean;
  readonly outline: Outline;
  /** Smallest drawn dimension in metres (thickness, width, short side, diameter); Infinity when there is none to speak of. */
  readonly smallestMetres: number;
}

export type ResolvedWaveform =
  | { readonly kind: 'band pulse' }
  | { readonly kind: 'continuous wave'; readonly frequencyHertz: number }
  | { readonly kind: 'damped step'; readonly riseSeconds: number; readonly decaySeconds: number }
  | { readonly kind: 'samples'; readonly times: readonly number[]; readonly values: readonly number[] };

export type ResolvedDrive =
  | {
      readonly id: string;
      readonly name: string;
      readonly kind: 'plane wave';
      readonly amplitude: number;
      readonly angleRadians: number;
      readonly waveform: ResolvedWaveform;
    }
  | {
      readonly id: string;
      readonly name: string;
      readonly kind: 'line current';
      readonly at: XY;
      readonly amplitude: number;
      readonly waveform: ResolvedWaveform;
    };

/** The job in SI numbers. Everything the engine may know of it. */
export interface ResolvedJob {
  readonly section: Section;
  readonly band: {
    readonly fromHertz: number;
    readonly toHertz: number;
    readonly points: number;
    readonly listedHertz: readonly number[];
  };
  readonly sheet: {
    readonly widthMetres: number;
    readonly heightMetres: number;
    /** Position of the user's origin from the lower left corner; sheet x runs from -origin[0] to width - origin[0]. */
    readonly originMetres: XY;
    readonly background: Medium;
    readonly edges: Readonly<Record<EdgeName, EdgeKind>>;
  };
  readonly grid: {
    readonly cells: { readonly perWavelength: number } | { readonly xMetres: number; readonly yMetres: number };
    readonly absorberCells: number;
    readonly courant: number;
  };
  readonly parts: readonly ResolvedPart[];
  readonly drives: readonly ResolvedDrive[];
  readonly probes: readonly { readonly id: string; readonly name: string; readonly at: XY }[];
  readonly reference: Job['reference'];
  /** decayDb Infinity: never. */
  readonly stop: { readonly decayDb: number; readonly afterSeconds: number };
}
