import { describe, expect, it } from 'vitest'
import { shorterShader } from '../../build/scripts/threeParts.mjs'

const MODULE =
  'export default /* glsl */`\n// why\n#ifdef USE_FOG\n\n\t/* a\n\tb */\n\tfloat a = 1.0 / 2.0; // half\n#endif\n`;\n'

describe('a shader of three.js', () => {
  it('loses its comments and indents, and no line of code', () => {
    expect(shorterShader(MODULE, true)).toBe('export default `\n#ifdef USE_FOG\nfloat a = 1.0 / 2.0;\n#endif\n`;\n')
  })

  it('that is not used is left out, and says so where it is compiled', () => {
    expect(shorterShader(MODULE, false)).toBe('export default `#error left out of this build`;\n')
  })

  it('that is written in another way is refused', () => {
    expect(() => shorterShader('export default "void main() {}"', true)).toThrow('does not write its shaders as it did')
  })
})
