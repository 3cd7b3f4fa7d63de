import type { Context } from '#server/context'
import type { Router } from 'express'
import { healthRoutes } from './health'

/** One line per feature. A test compares what is mounted with the contracts. */
const FEATURES = [healthRoutes]

export const featureRouters = (ctx: Context): Router[] => FEATURES.map((routes) => routes(ctx))
