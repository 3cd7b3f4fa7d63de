import type { Context } from '#server/context'
import type { Router } from 'express'
import { auditRoutes } from './audit'
import { awardsRoutes } from './awards'
import { healthRoutes } from './health'
import { mailRoutes } from './mail'
import { ordersRoutes } from './orders'
import { partsRoutes } from './parts'
import { peopleRoutes } from './people'
import { quoteRoutes } from './quotes'
import { rfqRoutes } from './rfqs'
import { samplesRoutes } from './samples'
import { specificationRoutes } from './specifications'
import { worklistRoutes } from './worklist'

/** One line per feature. A test compares what is mounted with the contracts. */
const FEATURES = [healthRoutes, peopleRoutes, mailRoutes, auditRoutes, partsRoutes, specificationRoutes, rfqRoutes, quoteRoutes, samplesRoutes, awardsRoutes, ordersRoutes, worklistRoutes]

export const featureRouters = (ctx: Context): Router[] => FEATURES.map((routes) => routes(ctx))
