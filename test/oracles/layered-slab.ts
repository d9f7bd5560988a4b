// Owns reflection and transmission of plane layers in vacuum at normal incidence, by the transfer matrix.
// Must not know the engine.
// Source: M. Born and E. Wolf, Principles of Optics, 7th ed., section 1.6 (characteristic matrix of a stratified medium),
// rewritten for exp(+jwt), wave impedance and lossy layers.
import { C0, EPS0, ETA0, MU0 } from '../../src/base/constants.ts';
import { add, cosine, divide, multiply, ONE, scale, sine, squareRoot, subtract, type Complex } from './complex.ts';

export interface Layer {
  readonly epsilonRelative: number;
  readonly muRelative: number;
  /** S/m */
  readonly sigma: number;
  /** ohm/m */
  readonly sigmaMagnetic: number;
  readonly thicknessMetres: number;
}

export interface SlabResponse {
  /** Ratio of tangential E, reflected over incident, at the front face. */
  readonly reflection: Complex;
  /** Ratio of tangential E, behind the back face over incident at the front face. */
  readonly transmission: Complex;
}

type Matrix = readonly [a: Complex, b: Complex, c: Complex, d: Complex];

function product(m: Matrix, n: Matrix): Matrix {
  return [
    add(multiply(m[0], n[0]), multiply(m[1], n[2])),
    add(multiply(m[0], n[1]), multiply(m[1], n[3])),
    add(multiply(m[2], n[0]), multiply(m[3], n[2])),
    add(multiply(m[2], n[1]), multiply(m[3], n[3])),
  ];
}

/** (E, H) at the front of a layer from (E, H) at its back. */
function layerMatrix(layer: Layer, omega: number): Matrix {
  const epsilon: Complex = [layer.epsilonRelative * EPS0, -layer.sigma / omega];
  const mu: Complex = [layer.muRelative * MU0, -layer.sigmaMagnetic / omega];
  const phase = scale(multiply(squareRoot(epsilon), squareRoot(mu)), omega * layer.thicknessMetres);
  const impedance = divide(squareRoot(mu), squareRoot(epsilon));
  const c = cosine(phase);
  const js = multiply([0, 1], sine(phase));
  return [c, multiply(impedance, js), divide(js, impedance), c];
}

export function makeSlabResponse(layers: readonly Layer[], frequencyHertz: number): SlabResponse {
  const omega = 2 * Math.PI * frequencyHertz;
  let m: Matrix = [ONE, [0, 0], [0, 0], ONE];
  for (const layer of layers) m = product(m, layerMatrix(layer, omega));
  const front = add(m[0], scale(m[1], 1 / ETA0));
  const back = add(scale(m[2], ETA0), m[3]);
  const sum = add(front, back);
  return { reflection: divide(subtract(front, back), sum), transmission: divide([2, 0], sum) };
}

/**
 * The same stack as the field ratio at a point behind it, against that point with the stack taken away:
 * the transmission with the vacuum path of the stack's own thickness divided out.
 */
export function insertionBehind(layers: readonly Layer[], frequencyHertz: number): Complex {
  const thickness = layers.reduce((sum, layer) => sum + layer.thicknessMetres, 0);
  const phase = (2 * Math.PI * frequencyHertz * thickness) / C0;
  return multiply(makeSlabResponse(layers, frequencyHertz).transmission, [Math.cos(phase), Math.sin(phase)]);
}
