import { describe } from 'vitest'
import { describeMatrix } from './matrix/describe-matrix'

describe('access with both locks closed', () => describeMatrix())
