/** Modules that the build makes. */
declare module '*/assembly/shapes?compiled' {
  /** a WebAssembly module, base64 */
  export const encodedKernel: string;
}
