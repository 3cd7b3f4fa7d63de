/** What `useQuery` of @pinia/colada answers as `state`. */
export interface QueryState<D> {
  status: 'pending' | 'error' | 'success'
  data?: D
  error: Error | null
}
