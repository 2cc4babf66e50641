/** Sentences of the core carry SI values to the last digit; beside a table they speak its units, to the digits one reads. */
import { formatNumber, fromBase } from '../../core/quantity'
import type { Units } from './units'

const NUMBER = String.raw`[-\u2212]?\d+(?:\.\d+)?(?:e[-+]?\d+)?`
/** One value or several with commas, and the SI unit they share. */
const VALUES = new RegExp(String.raw`((?:${NUMBER}, )*${NUMBER})[ \u00A0](m2/s|m/s|m|s)(?![\w/²³])`, 'gu')

/** A sentence about the wake in the units shown. @param digits significant digits */
export function inShownUnits(sentence: string, units: Units, digits = 6): string {
  const shown: Readonly<Record<string, string>> = {
    m: units.length,
    s: units.wakeTime,
    'm/s': units.ringSpeed,
    'm2/s': units.circulation,
  }
  return sentence.replace(VALUES, (all, values: string, symbol: string) => {
    const unit = shown[symbol]
    if (unit === undefined) return all
    const list = values
      .split(', ')
      .map((value) => formatNumber(fromBase(Number(value.replace('\u2212', '-')), unit), digits))
    return `${list.join(', ')}\u00A0${unit}`
  })
}
