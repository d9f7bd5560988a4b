export interface KernelImports extends Record<string, WebAssembly.ImportValue> {
  readonly memory: WebAssembly.Memory;
}
export function kernelImports(memory: WebAssembly.Memory): KernelImports;
