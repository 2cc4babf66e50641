import { fileURLToPath } from 'node:url'
import { build } from 'vite'

/** One TypeScript file of the tree with all it imports as one script. @param entry path relative to this file. */
export async function bundled(entry: string, format: 'cjs' | 'es'): Promise<string> {
  const bundle = await build({
    configFile: false,
    logLevel: 'silent',
    build: {
      ssr: fileURLToPath(new URL(entry, import.meta.url)),
      write: false,
      minify: false,
      rolldownOptions: { output: { format } },
    },
  })
  const output = 'output' in bundle ? bundle.output : Array.isArray(bundle) ? bundle.flatMap((part) => part.output) : []
  const script = output.find((part) => part.type === 'chunk' && part.isEntry)
  if (script?.type !== 'chunk') throw new Error(`${entry} was not bundled`)
  return script.code
}
