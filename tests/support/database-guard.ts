/** Before anything is made, dropped or attacked. */
export function refuseOtherDatabases(databaseName: string): void {
  if (!/^dotside_[a-z0-9_]*_test$/.test(databaseName)) throw new Error(`Not a test database: ${databaseName}`)
}
