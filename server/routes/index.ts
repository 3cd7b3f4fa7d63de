import type { Context } from '#server/context'
import type { Router } from 'express'
import { healthRoutes } from './health'
import { partsRoutes } from './parts'

/** One line per feature. A test compares what is mounted with the contracts. */
const FEATURES = [healthRoutes, partsRoutes]

export const featureRouters = (ctx: Context): Router[] => FEATURES.map((routes) => routes(ctx))
