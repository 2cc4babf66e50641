import { execFileSync } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'

/** What the C program says: seconds of processor time a pair, and the sum of all velocities. */
export interface LimitRun {
  readonly secondsAPair: number
  readonly sum: number
}

/** The pair sums of kernel.c at one width of vectors. */
export interface KernelLimit {
  readonly run: (what: 'segments' | 'rings', count: number, repeats: number) => LimitRun
}

/**
 * Widths. 128 bits without AVX has no fused multiply-add, as WebAssembly has none, and is what its instructions can reach;
 * AVX2 is what a program for this machine alone could use.
 */
const WIDTHS = {
  '128 bits': ['-mno-avx'],
  AVX2: ['-mprefer-vector-width=256', '-mno-avx512f'],
} as const

export type Width = keyof typeof WIDTHS

/** Compiles kernel.c with gcc at both widths and hands the programs to `use`; null where gcc is missing or refuses. */
export function withLimits<T>(source: string, use: (limits: Readonly<Record<Width, KernelLimit>> | null) => T): T {
  const folder = mkdtempSync(path.join(tmpdir(), 'ringwright-bench-'))
  try {
    return use(compiled(source, folder))
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

function compiled(source: string, folder: string): Readonly<Record<Width, KernelLimit>> | null {
  try {
    return { '128 bits': compile(source, folder, '128 bits'), AVX2: compile(source, folder, 'AVX2') }
  } catch {
    return null
  }
}

function compile(source: string, folder: string, width: Width): KernelLimit {
  const program = path.join(folder, width.replace(' ', '-'))
  const flags = ['-O3', '-march=native', '-ffast-math', ...WIDTHS[width]]
  execFileSync('gcc', [...flags, source, '-o', program, '-lm'], { stdio: 'ignore' })
  const run: KernelLimit['run'] = (what, count, repeats) => {
    const [nanoseconds = '', sum = ''] = execFileSync(program, [what, String(count), String(repeats)], {
      encoding: 'utf8',
    }).split(/\s+/)
    return { secondsAPair: Number(nanoseconds) * 1e-9, sum: Number(sum) }
  }
  // A program that does not run here (flags the processor lacks) must show now.
  run('rings', 4, 1)
  return { run }
}
