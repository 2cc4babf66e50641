/** Apart so that it is loaded with the first sizing. */
export { sizeThruster } from '../thruster'
