import { it } from 'vitest'
import { examplePlan } from '../../../core/plan'
import { run } from '../../../core/run'
it('x', async () => {
  const base: any = examplePlan('tank-day')
  for (const [name, cam] of Object.entries(JSON.parse(process.env.CAMS ?? '{}'))) {
    const { stations, trigger, ...camera } = cam as any
    const plan: any = { ...base, tankRun: { ...base.tankRun, stations: stations ?? base.tankRun.stations, camera: { ...base.tankRun.camera, ...camera }, trigger: trigger ?? base.tankRun.trigger } }
    const { data, status, message } = await run(plan, { sections: ['tankRun'] })
    const t: any = data?.tankRun
    console.log('#####', name, status, message)
    const { refraction, notes, ...rest } = t.imaging
    console.log(JSON.stringify(rest), JSON.stringify(notes))
    console.log((data?.cautions ?? []).map((c) => ` - ${c.id}: ${c.text}`).join('\n'))
    console.log(JSON.stringify((t.triggers ?? t.result?.triggers)?.rows?.map((r: any) => [r.device, r.time, r.early, r.late])))
    if (name === 'asis') console.log(JSON.stringify(t.arrivals))
  }
})
