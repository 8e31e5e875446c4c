/** three ships its crate parser without types. */
declare module 'three/examples/jsm/loaders/usd/USDCParser.js' {
  export class USDCParser {
    /** Specs by path; an attribute's value is under `default`. */
    parseData(buffer: ArrayBuffer): { specsByPath: Record<string, { specType: number; fields: Record<string, unknown> }> };
  }
}
