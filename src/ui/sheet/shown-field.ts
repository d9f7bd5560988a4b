// Owns which frame of the field is shown, and at which scale.
// Must not know canvases, React, or how a frame is painted.
import { latestFrame } from '../../app/frame-channel.ts';
import { useRunStore } from '../../app/run-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import { rememberScale, type ScaleMemory } from './field-picture.ts';
import type { FieldScale } from './layers/scale-layer.ts';
import type { FieldShown } from './stage.ts';

export class ShownField {
  #memory: ScaleMemory | null = null;

  /** The newest frame, unless the field is off; full scale as typed, else following the field. */
  read(): FieldShown {
    const { fieldPlace, fieldScale, decibelSpan } = useViewStore.getState();
    const frame = fieldPlace === 'off' ? null : latestFrame();
    const atRest = useRunStore.getState().progress.state !== 'running';
    if (frame !== null) this.#memory = rememberScale(this.#memory, frame, atRest);
    return { frame, fullScale: fieldScale ?? this.#memory?.scale ?? 0, spanDb: decibelSpan };
  }

  /** For the colour scale; null while no field is shown. */
  readScale(): FieldScale | null {
    const { frame, fullScale, spanDb } = this.read();
    return frame === null ? null : { view: frame.view, fullScale, spanDb };
  }
}
