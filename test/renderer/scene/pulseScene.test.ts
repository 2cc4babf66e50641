import { mount } from '@vue/test-utils'
import { nextTick } from 'vue'
import { describe, expect, it } from 'vitest'
import PulseScene from '../../../renderer/scene/PulseScene.vue'
import { drawingMeans } from '../../../renderer/scene/webgl'
import { sceneAt } from './scenes'

describe('the drawing where there is no WebGL', () => {
  it('is told by the machine, not assumed', () => {
    // No canvas of this environment gives a WebGL context.
    expect(drawingMeans()).toEqual({ available: false, software: true })
  })

  it('is the flat side view with the same description', async () => {
    const model = sceneAt(3)
    const scene = mount(PulseScene, { props: { model }, attachTo: document.body })
    await nextTick()
    const image = scene.get('img')
    expect(image.attributes('alt')).toBe(model.description)
    expect(decodeURIComponent(image.attributes('src') ?? '')).toContain('fluid carried along')
    expect(scene.text()).toContain('convention')
    scene.unmount()
  })

  it('still exports its SVG, and says why there is no PNG', async () => {
    const scene = mount(PulseScene, { props: { model: sceneAt(3) }, attachTo: document.body })
    await nextTick()
    await scene.get('button[aria-label="Drawing as SVG, side view"]').trigger('click')
    expect(scene.emitted('export')?.[0]?.[0]).toMatchObject({ kind: 'svg', name: 'pulse-drawing.svg' })
    expect(scene.find('button[aria-label="Drawing as PNG"]').exists()).toBe(false)
    await expect(scene.vm.toPng()).rejects.toThrow('no three-dimensional drawing')
    scene.unmount()
  })

  it('follows another model', async () => {
    const scene = mount(PulseScene, { props: { model: sceneAt(3) }, attachTo: document.body })
    await nextTick()
    const before = scene.get('img').attributes('src')
    await scene.setProps({ model: sceneAt(1) })
    expect(scene.get('img').attributes('src')).not.toBe(before)
    scene.unmount()
  })
})
