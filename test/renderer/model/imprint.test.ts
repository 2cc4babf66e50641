import { describe, expect, it } from 'vitest'
import { plotToSvg, pulsePlots } from '../../../core/report'
import { examplePlan, setTitle } from '../../../core/plan'
import { imprintLine } from '../../../renderer/model/imprint'
import { computed, fakeHost, makeWorkspace } from '../parts/mountWithWorkspace'

async function exported(title: string) {
  const host = fakeHost()
  const workspace = makeWorkspace(setTitle(examplePlan('sharp-orifice'), title), host)
  await computed(workspace)
  const pulse = workspace.results.finished.value?.data.pulse ?? null
  const plot = pulse === null ? undefined : pulsePlots(pulse, workspace.units.value)[0]
  if (plot === undefined) throw new Error('the example has plots')
  const svg = plotToSvg(plot, { width: 640, height: 400, theme: 'light' })
  const send = workspace.host.exportFile
  return { host, svg, send }
}

describe('pictures that leave the window', () => {
  it('bear the title of the plan and the program, and tables stay as they are', async () => {
    const { host, svg, send } = await exported('Orifice & <plate>')
    await send('svg', 'plot.svg', svg)
    await send('csv', 'plot.csv', 'a,b\n1,2\n')
    expect(String(host.exports[0]?.content)).toMatch(
      />Orifice &amp; &lt;plate&gt;, Ringwright \d+\.\d+\.\d+<\/text><\/svg>\n$/,
    )
    expect(host.exports[1]?.content).toBe('a,b\n1,2\n')
  })

  it('bear the program alone where the plan has no title, and no date', async () => {
    const { host, svg, send } = await exported('  ')
    await send('svg', 'plot.svg', svg)
    await send('svg', 'plot.svg', svg)
    expect(String(host.exports[0]?.content)).toMatch(/>Ringwright \d+\.\d+\.\d+<\/text><\/svg>\n$/)
    expect(host.exports[0]?.content).toBe(host.exports[1]?.content)
    expect(imprintLine(' a ')).toMatch(/^a, Ringwright /)
  })

  it('are not written where they cannot be imprinted, and a sentence says why', async () => {
    const { host, send } = await exported('Orifice')
    const saved = await send('svg', 'plot.svg', '<p>no drawing</p>')
    expect(saved).toEqual({ failure: expect.stringMatching(/^plot\.svg was not written: svg must be a drawing/) })
    expect(host.exports).toHaveLength(0)
  })
})
