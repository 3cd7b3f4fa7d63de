import type { Access } from '#shared/contracts/endpoint'
import { PART_READERS } from '#shared/contracts/parts'
import { AWARD_READERS } from './awards'
import { RFQ_READERS } from './rfqs'
import { SAMPLE_READERS } from './samples'
import { SPECIFICATION_READERS } from './specifications'

export interface Section {
  /** Name of the route it opens. */
  route: string
  title: string
  access: Access
}

/** What stands on the rail, in the order of the work. Each feature adds its line where it belongs. */
export const SECTIONS: readonly Section[] = [
  { route: 'worklist', title: 'Worklist', access: 'signed-in' },
  { route: 'specifications', title: 'Specifications', access: SPECIFICATION_READERS },
  { route: 'parts', title: 'Parts library', access: PART_READERS },
  { route: 'rfqs', title: 'Enquiries', access: RFQ_READERS },
  { route: 'enquiries', title: 'Enquiries', access: ['vendor'] },
  { route: 'samples', title: 'Samples', access: SAMPLE_READERS },
  { route: 'vendor-samples', title: 'Samples', access: ['vendor'] },
  { route: 'awards', title: 'Awards', access: AWARD_READERS },
  { route: 'orders', title: 'Orders', access: AWARD_READERS },
  { route: 'vendor-orders', title: 'Orders', access: ['vendor'] },
  { route: 'vendors', title: 'Vendors', access: ['buyer', 'quality', 'approver', 'admin', 'engineer', 'checker'] },
  { route: 'customers', title: 'Customers', access: ['vendor'] },
  { route: 'companies', title: 'Companies', access: ['operator'] },
  { route: 'people', title: 'People', access: ['admin', 'vendor', 'operator'] },
]
