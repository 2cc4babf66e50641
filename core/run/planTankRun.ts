/** Apart so that it is loaded with the first tank run. */
export { planTankRun } from '../tank'
