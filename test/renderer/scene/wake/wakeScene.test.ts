import { mount } from '@vue/test-utils'
import { nextTick } from 'vue'
import { describe, expect, it } from 'vitest'
import { at } from '../../../../core/base'
import { ringMeshes, ringsToGltf } from '../../../../renderer/scene/wake/gltf'
import WakeScene from '../../../../renderer/scene/wake/WakeScene.vue'
import { expectNear } from '../../../support/close'
import { pairScene, shapeAt } from './wakeModels'

const SHOWN = { trails: true, stations: true, dye: false, plane: false }

function mounted(index = 0) {
  const props = { model: pairScene(), index, selected: null, follow: false, shown: SHOWN }
  return mount(WakeScene, { props, attachTo: document.body })
}

describe('the drawing of rings where there is no WebGL', () => {
  it('is the flat side view of the time shown, with the same description', async () => {
    const scene = mounted()
    await nextTick()
    const image = scene.get('img')
    expect(image.attributes('alt')).toBe(scene.props('model').description)
    const before = decodeURIComponent(image.attributes('src') ?? '')
    expect(before).toContain('station 100')
    await scene.setProps({ index: 8 })
    expect(decodeURIComponent(scene.get('img').attributes('src') ?? '')).not.toBe(before)
    expect(scene.text()).toContain('no WebGL')
    scene.unmount()
  })

  it('marks the picked ring, cycles with the page keys and lets go with Escape', async () => {
    const scene = mounted()
    await nextTick()
    const canvas = scene.get('canvas')
    await canvas.trigger('keydown', { key: 'PageDown' })
    expect(scene.emitted('pick')?.at(-1)).toEqual([1])
    await scene.setProps({ selected: 1 })
    expect(decodeURIComponent(scene.get('img').attributes('src') ?? '')).toContain('ring 1')
    await canvas.trigger('keydown', { key: 'PageDown' })
    expect(scene.emitted('pick')?.at(-1)).toEqual([2])
    await canvas.trigger('keydown', { key: 'Escape' })
    expect(scene.emitted('pick')?.at(-1)).toEqual([null])
    scene.unmount()
  })

  it('still writes its SVG, and says why there is no PNG', async () => {
    const scene = mounted(3)
    await nextTick()
    expect(scene.vm.toSvg()).toContain('Rings to scale at')
    await expect(scene.vm.toPng()).rejects.toThrow('no three-dimensional drawing')
    scene.unmount()
  })
})

describe('rings for other programs', () => {
  const shapes = [shapeAt(1, 0), shapeAt(3, 0.1)]

  it('are tubes of their true core radius in metres, named by their numbers', () => {
    const meshes = ringMeshes(shapes, () => '#0A5F78')
    expect(meshes.map(({ name }) => name)).toEqual(['ring 1', 'ring 3'])
    const { positions } = at(meshes, 1)
    expect(positions.length).toBeGreaterThan(0)
    for (let i = 0; i < positions.length; i += 3) {
      const across = Math.hypot(at(positions, i + 1), at(positions, i + 2)) - 0.02
      // Single precision of numbers near 0.1.
      expectNear(Math.hypot(at(positions, i) - 0.1, across), 0.004, 2e-8)
    }
  })

  it('have their colour in linear light', () => {
    // IEC 61966-2-1, worked by hand to the digits given.
    const { colour } = at(
      ringMeshes(shapes, (ring) => (ring === 1 ? '#0a80ff' : '#000000')),
      0,
    )
    // 10/255/12.92, ((128/255 + 0.055)/1.055)^2.4, 1: half a unit of the last digit given.
    expectNear(at(colour, 0), 0.0030353, 5e-8)
    expectNear(at(colour, 1), 0.215861, 5e-7)
    expectNear(at(colour, 2), 1, 1e-15)
  })

  it('are written as glTF 2.0 with one mesh a ring', () => {
    const document: unknown = JSON.parse(ringsToGltf(shapes, () => '#0A5F78'))
    expect(document).toMatchObject({
      asset: { version: '2.0' },
      scenes: [{ name: 'wake', nodes: [0, 1] }],
      nodes: [
        { name: 'ring 1', mesh: 0 },
        { name: 'ring 3', mesh: 1 },
      ],
    })
    expect(JSON.stringify(document)).not.toContain('null')
  })
})
