/**
 * What the machine can draw with.
 */

export interface DrawingMeans {
  readonly available: boolean
  /** Drawn by the processor: no multisampling, which costs most there. */
  readonly software: boolean
}

const SOFTWARE = /swiftshader|llvmpipe|softpipe|software|basic render/i

/** Ask once with a context that is given back at once. */
export function drawingMeans(): DrawingMeans {
  const canvas = document.createElement('canvas')
  let context: WebGL2RenderingContext | null = null
  try {
    context = canvas.getContext('webgl2')
  } catch {
    context = null
  }
  if (context === null) return { available: false, software: true }
  const details = context.getExtension('WEBGL_debug_renderer_info')
  const name = String(context.getParameter(details === null ? context.RENDERER : details.UNMASKED_RENDERER_WEBGL))
  context.getExtension('WEBGL_lose_context')?.loseContext()
  return { available: true, software: SOFTWARE.test(name) }
}
