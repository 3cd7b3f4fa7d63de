import { defineQueryOptions } from '@pinia/colada'
import { listWorklist } from '#shared/contracts/worklist'
import { call } from '@/api/call'

export const worklistQuery = defineQueryOptions({ key: ['worklist'], query: () => call(listWorklist), staleTime: 0 })
