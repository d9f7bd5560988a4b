// Owns the way to a picture of the sheet: the sheet registers how it is made, an export asks for it.
// Must not know canvases or how the sheet draws.

export type SheetExporter = () => Promise<Blob>;

let current: SheetExporter | null = null;

/** The answer takes the exporter away again, unless another has taken its place. */
export function registerSheetExporter(exporter: SheetExporter): () => void {
  current = exporter;
  return () => {
    if (current === exporter) current = null;
  };
}

/** PNG of the sheet as shown, or null while no sheet is on the screen. */
export async function exportSheet(): Promise<Blob | null> {
  return current === null ? null : current();
}
