/** The regular bicubic patch's moments two patches at a time in WebAssembly, equal to the last bit to the JavaScript kernel. */
export const PATCHES_PER_VECTOR = 2;
