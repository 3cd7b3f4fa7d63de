export * from './tube'
export * from './layers'
export * from './types'
export { layOutCoil } from './coil'
