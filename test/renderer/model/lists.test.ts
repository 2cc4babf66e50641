import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { examplePlan, sampleLists, writeLists } from '../../../core/plan'
import { createDocument } from '../../../renderer/model/document'
import { createLists, type ListsStorage } from '../../../renderer/model/lists'
import { partInWords } from '../../../renderer/model/partWords'
import { shownUnits } from '../../../renderer/model/units'

function memory(kept: Record<string, string> = {}): ListsStorage & { readonly kept: Record<string, string> } {
  return {
    kept,
    getItem: (key) => kept[key] ?? null,
    setItem(key, value) {
      kept[key] = value
    },
  }
}

const KEY = 'ringwright.lists'

describe('the parts lists of the window', () => {
  it('keep the plan’s part, find it again at the next start, and copy it into another plan as one step of undo', () => {
    const storage = memory()
    const first = createLists(createDocument(examplePlan('sharp-orifice')), storage)
    expect(first.keep('nozzles', 'Plate')).toBe('Plate')
    expect(first.keep('nozzles', 'Plate')).toBe('Plate (2)')

    const document = createDocument(examplePlan('bench-generator'))
    const before = document.content.value
    const second = createLists(document, storage)
    expect(second.lists.value.nozzles.map(({ name }) => name)).toEqual(['Plate', 'Plate (2)'])
    expect(second.use('nozzles', at(second.lists.value.nozzles, 0))).toBeNull()
    expect(document.content.value.nozzle).toMatchObject({ shape: 'orifice', diameter: 0.02 })
    expect(document.undoName.value).toBe('nozzle from list')
    document.undo()
    expect(document.content.value).toBe(before)
  })

  it('say where a part without a place in the plan would go', () => {
    const lists = createLists(createDocument(examplePlan('bench-generator')), null)
    lists.addSamples()
    expect(lists.use('cameras', at(lists.lists.value.cameras, 0))).toMatch(/no tank run .* Tank run page/)
    expect(lists.use('vehicles', at(lists.lists.value.vehicles, 0))).toMatch(/no thrusters .* Thrust page/)
    expect(lists.keep('vehicles', 'Mine')).toBeNull()
  })

  it('put back what a removal took, until something else changes', () => {
    const lists = createLists(createDocument(examplePlan('bench-generator')), null)
    lists.addSamples()
    const all = lists.lists.value
    lists.remove('tanks', at(all.tanks, 0).name)
    expect(lists.lists.value.tanks).toEqual([])
    expect(lists.removed.value).toEqual({ kind: 'tanks', name: at(all.tanks, 0).name })
    lists.putBack()
    expect(lists.lists.value).toEqual(all)
    expect(lists.removed.value).toBeNull()
    lists.remove('tanks', at(all.tanks, 0).name)
    lists.rename('nozzles', at(all.nozzles, 0).name, 'Other')
    lists.putBack()
    expect(lists.lists.value.tanks).toEqual([])
  })

  it('import a file beside what is there, and refuse one that is none', () => {
    const lists = createLists(createDocument(examplePlan('bench-generator')), null)
    const text = writeLists(sampleLists())
    expect(lists.importText('parts.json', text)).toEqual({ text: 'parts.json: 8 parts added.', failed: false })
    expect(lists.importText('parts.json', text).text).toMatch(/nothing that the lists do not have/)
    expect(lists.importText('plan.json', '{"format":"ringwright-plan"}')).toMatchObject({ failed: true })
    expect(lists.text()).toBe(text)
  })

  it('leave kept lists they cannot read alone until a change, and then keep a copy of them', () => {
    const newer = JSON.stringify({ format: 'ringwright-lists', version: 9 })
    const storage = memory({ [KEY]: newer })
    const lists = createLists(createDocument(examplePlan('bench-generator')), storage)
    expect(lists.failure.value).toMatch(/not read: .*newer version \(9\)/)
    expect(storage.kept[KEY]).toBe(newer)
    lists.addSamples()
    expect(lists.failure.value).toBeNull()
    expect(storage.kept[`${KEY}.unread`]).toBe(newer)
    expect(storage.kept[KEY]).toBe(writeLists(sampleLists()))
  })

  it('say so where the storage is full', () => {
    const full: ListsStorage = {
      getItem: () => null,
      setItem() {
        throw new Error('quota')
      },
    }
    const lists = createLists(createDocument(examplePlan('bench-generator')), full)
    lists.addSamples()
    expect(lists.lists.value).toEqual(sampleLists())
    expect(lists.failure.value).toMatch(/could not be kept/)
  })
})

describe('a part in words', () => {
  it('names the numbers it is chosen by, in the shown units', () => {
    const { nozzles, cameras } = sampleLists()
    const units = shownUnits({ length: 'cm' })
    expect(partInWords('nozzles', at(nozzles, 0), units).replaceAll('\u00A0', ' ')).toBe(
      'tube, exit diameter 2.5 cm, piston diameter 5 cm',
    )
    expect(partInWords('cameras', at(cameras, 0), units)).toContain('5120 × 2560 px')
  })
})
