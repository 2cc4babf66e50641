/** Pictures of a finished wake, apart so that they are loaded when one is asked for. */
export { wakePicture } from '../../core/run'
