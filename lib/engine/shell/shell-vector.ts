import { ALONG_EXTRA, inputStride, type PatchKind } from '../kernel/patch-kinds';
import { FAN_ROOM } from '../kernel/scalar-fans';
import { TRIANGLE_POWERS } from '../kernel/triangle-powers';
import { gaussRule } from '../patches/gauss-rule';
import { SHELL_BYTES } from './shell-bytes';
import { BENDS_STRIDE, POWERS_STRIDE, scalarShellKernel, SHELL_PAIRS, TOTALS_STRIDE, type ShellKernel } from './shell-kernel';
import { MOST_SHELL_NODES } from './shell-nodes';
import { SHELL_TERMS } from './shell-terms';

/** Doubles of the kernel's memory: Gauss rules, nodes and then weights, from RULE_STRIDE · count on; the triangle's table; the pairs. */
const RULE_STRIDE = 2 * (MOST_SHELL_NODES + 1);
const TABLE_AT = RULE_STRIDE * (MOST_SHELL_NODES + 2);
const INPUT_AT = 640;

type Bend = (pairs: number, input: number, powers: number, bends: number, table: number) => void;
type Terms = (pairs: number, powers: number, output: number, counts: number, rules: number, ruleBytes: number) => void;
type Routine = (...integers: number[]) => void;

const EXPORTS: Readonly<Record<PatchKind, readonly [bend: string, terms: string]>> = {
  bicubic: ['bendBicubic', 'termsBicubic'], biquadratic: ['bendBiquadratic', 'termsBiquadratic'], triangle: ['bendTriangle', 'termsTriangle'],
};

let code: WebAssembly.Module | null | undefined;
const kernels = { patches: new Map<PatchKind, ShellKernel>(), fans: new Map<PatchKind, ShellKernel>() };

/** This thread's kernel of a kind for a use: vectors where the machine has them, else JavaScript. */
export function shellKernel(kind: PatchKind, use: 'patches' | 'fans'): ShellKernel {
  let kernel = kernels[use].get(kind);
  if (kernel === undefined) {
    kernel = vectorShellKernel(kind) ?? scalarShellKernel(kind);
    kernels[use].set(kind, kernel);
  }
  return kernel;
}

/** A vector kernel with a memory of its own; null where this machine has no WebAssembly with SIMD or forbids it. */
export function vectorShellKernel(kind: PatchKind): ShellKernel | null {
  try {
    code ??= new WebAssembly.Module(Uint8Array.from(atob(SHELL_BYTES), (letter) => letter.charCodeAt(0)));
    const [bend, terms] = EXPORTS[kind];
    const { memory, [bend]: bendPatches, [terms]: addTerms, refineFans, gatherFans, sumFans } = new WebAssembly.Instance(code).exports;
    if (!(memory instanceof WebAssembly.Memory) || typeof bendPatches !== 'function' || typeof addTerms !== 'function') return null;
    if (typeof refineFans !== 'function' || typeof gatherFans !== 'function' || typeof sumFans !== 'function') return null;
    return wrap(kind, new Float64Array(memory.buffer), bendPatches as Bend, addTerms as Terms, refineFans as Routine, gatherFans as Routine, sumFans as Routine);
  } catch {
    return null;
  }
}

function wrap(kind: PatchKind, doubles: Float64Array, bend: Bend, terms: Terms, refineFans: Routine, gatherFans: Routine, sumFans: Routine): ShellKernel {
  const stride = inputStride(kind);
  const powersAt = INPUT_AT + SHELL_PAIRS * stride;
  const bendsAt = powersAt + SHELL_PAIRS * POWERS_STRIDE;
  const outputAt = bendsAt + SHELL_PAIRS * BENDS_STRIDE;
  const countsAt = outputAt + SHELL_PAIRS * TOTALS_STRIDE;
  const fansAt = countsAt + SHELL_PAIRS / 2;
  const fanAt = (place: number): number => 8 * (fansAt + place);
  const counts = new Int32Array(doubles.buffer, 8 * countsAt, SHELL_PAIRS);
  doubles.set(TRIANGLE_POWERS, TABLE_AT);
  return {
    kind, counts,
    input: doubles.subarray(INPUT_AT, powersAt),
    powers: doubles.subarray(powersAt, bendsAt),
    bends: doubles.subarray(bendsAt, outputAt),
    output: doubles.subarray(outputAt, countsAt),
    bend: (pairs) => bend(pairs, 8 * INPUT_AT, 8 * powersAt, 8 * bendsAt, 8 * TABLE_AT),
    terms(pairs) {
      // Put anew each time: a rule gone wrong must show in the numbers here as in the moments' kernels.
      for (let count = 2; count <= MOST_SHELL_NODES + ALONG_EXTRA[kind]; count++) {
        const { nodes, weights } = gaussRule(count);
        doubles.set(nodes, RULE_STRIDE * count);
        doubles.set(weights, RULE_STRIDE * count + count);
      }
      terms(pairs, 8 * powersAt, 8 * outputAt, 8 * countsAt, 0, 8 * RULE_STRIDE);
    },
    fans: {
      memory: doubles.subarray(fansAt, fansAt + FAN_ROOM),
      integers: new Int32Array(doubles.buffer, 8 * fansAt, 2 * FAN_ROOM),
      refine: (fans, width, rows, starts, columns, factors, source, target) =>
        refineFans(fans, 8 * width, rows, fanAt(starts), fanAt(columns), fanAt(factors), fanAt(source), fanAt(target)),
      gather: (first, patches, perFan, points, nets, state, width) =>
        gatherFans(first, patches, perFan, points, fanAt(nets), fanAt(state), 8 * width, 8 * INPUT_AT, 8 * stride),
      sum: (first, patches, perFan, sums) => sumFans(first, patches, perFan, SHELL_TERMS, 8 * outputAt, 8 * TOTALS_STRIDE, fanAt(sums)),
    },
  };
}
