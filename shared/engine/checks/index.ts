export { runChecks } from './run'
