import type { Context } from '#server/context'
import type { Router } from 'express'
import { auditRoutes } from './audit'
import { healthRoutes } from './health'
import { mailRoutes } from './mail'
import { partsRoutes } from './parts'
import { peopleRoutes } from './people'
import { quoteRoutes } from './quotes'
import { rfqRoutes } from './rfqs'
import { specificationRoutes } from './specifications'
import { worklistRoutes } from './worklist'

/** One line per feature. A test compares what is mounted with the contracts. */
const FEATURES = [healthRoutes, peopleRoutes, mailRoutes, auditRoutes, partsRoutes, specificationRoutes, rfqRoutes, quoteRoutes, worklistRoutes]

export const featureRouters = (ctx: Context): Router[] => FEATURES.map((routes) => routes(ctx))
