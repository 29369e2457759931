/** A kernel written in AssemblyScript, compiled by the build: the bytes of its WebAssembly module. */
declare module '*.as.ts?kernel' {
  const bytes: Uint8Array<ArrayBuffer>;
  export default bytes;
}
