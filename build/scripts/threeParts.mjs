/**
 * Takes of three.js what the drawings use. Its bundled build holds every shader and every service of its renderer whether used or
 * not; its modules, which it publishes under `three/src`, are read instead, and what no drawing can reach is left out of them.
 *
 * What is left out says so as soon as it is asked for, and a release of three.js that lies differently fails the build.
 */
import { readFileSync } from 'node:fs'
import path from 'node:path'

const ENTRY = 'three/src/Three.js'

/** Shaders of the materials in use: MeshBasicMaterial, MeshLambertMaterial, PointsMaterial. */
const PROGRAMS = ['meshbasic', 'meshlambert', 'points']

/**
 * What the renderer makes only for reflected surroundings and tone mapping.
 *
 * @type {Readonly<Record<string, string>>}
 */
const LEFT_OUT = {
  'extras/PMREMGenerator.js': 'PMREMGenerator',
  'renderers/WebGLCubeRenderTarget.js': 'WebGLCubeRenderTarget',
  'renderers/webgl/WebGLOutput.js': 'WebGLOutput',
}

/** @returns {import('vite').Plugin} */
export function threeParts() {
  let source = ''
  /** @type {ReadonlySet<string>} */
  let wanted = new Set()
  return {
    name: 'ringwright:three-parts',
    apply: 'build',
    enforce: 'pre',
    async buildStart() {
      const entry = await this.resolve(ENTRY)
      if (entry === null) throw new Error(`three.js does not publish ${ENTRY} any more.`)
      source = path.dirname(path.normalize(entry.id)) + path.sep
      wanted = shaderParts(source)
      for (const [place, name] of Object.entries(LEFT_OUT))
        if (!readFileSync(path.join(source, place), 'utf8').includes(`export { ${name} }`))
          throw new Error(`three.js does not export ${name} as it did.`)
    },
    resolveId(id, importer) {
      return id === 'three' ? this.resolve(ENTRY, importer) : null
    },
    transform(code, id) {
      if (!path.normalize(id).startsWith(source)) return null
      const place = path.relative(source, id).split(path.sep).join('/')
      const name = LEFT_OUT[place]
      if (name !== undefined) return { code: refusing(name), map: null }
      return place.endsWith('.glsl.js') ? { code: shorterShader(code, wanted.has(place)), map: null } : null
    },
  }
}

/** A module in place of one that is left out. @param {string} name what it exports */
function refusing(name) {
  return `export function ${name}() { throw new Error('${name} of three.js is left out of this build.') }`
}

const TEXT = /\/\* glsl \*\/`([^`]*)`/g

/** The module of a shader without comments and indents, or without its text. @param {string} code @param {boolean} kept */
export function shorterShader(code, kept) {
  if (code.search(TEXT) < 0) throw new Error('three.js does not write its shaders as it did.')
  return code.replace(TEXT, (_, /** @type {string} */ text) => {
    const shader = kept ? withoutRemarks(text) : '#error left out of this build'
    return `\`${shader}\``
  })
}

/** @param {string} text of a shader */
function withoutRemarks(text) {
  return text
    .replace(/\/\*[^]*?\*\//g, '')
    .replace(/\/\/.*$/gm, '')
    .replace(/^[ \t]+|[ \t]+$/gm, '')
    .replace(/\n{2,}/g, '\n')
}

/** Files of the shaders in use and of all that they include. @param {string} source @returns {ReadonlySet<string>} */
function shaderParts(source) {
  /** @type {Set<string>} */
  const parts = new Set()
  const program = readFileSync(path.join(source, 'renderers', 'webgl', 'WebGLProgram.js'), 'utf8')
  const places = PROGRAMS.map((name) => `ShaderLib/${name}.glsl.js`)
  // What is put in front of every shader.
  for (const [, name] of program.matchAll(/ShaderChunk\[ '(\w+)' \]/g)) places.push(`ShaderChunk/${name}.glsl.js`)
  if (places.length === PROGRAMS.length) throw new Error('three.js does not put its shaders together as it did.')
  for (const place of places) {
    if (parts.has(`renderers/shaders/${place}`)) continue
    parts.add(`renderers/shaders/${place}`)
    const text = readFileSync(path.join(source, 'renderers', 'shaders', place), 'utf8')
    for (const [, name] of text.matchAll(/^[ \t]*#include <(\w+)>/gm)) places.push(`ShaderChunk/${name}.glsl.js`)
  }
  return parts
}
