/** Apart so that it is loaded with the first readings. */
export { compareReadings } from '../tank'
