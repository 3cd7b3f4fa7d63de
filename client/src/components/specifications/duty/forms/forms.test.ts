import { describe, expect, it } from 'vitest'
import { requirementSheetSchema } from '#shared/contracts/specification-document'
import type { Duty } from '#shared/engine/specification'
import { valueAt, withValue } from '../../document-paths'
import { allDutyFields, inputFields, newRequirement, supplyChoice } from '../duty-fields'
import { DUTY_FORMS, DUTY_TOPOLOGIES, formOf } from './index'

describe.each(DUTY_TOPOLOGIES)('the form of %s', (topology) => {
  const requirement = newRequirement(topology)
  const { duty } = requirement
  const form = formOf(duty)

  it('begins with a sheet that the interface takes', () => {
    expect(requirementSheetSchema.safeParse(requirement).error).toBeUndefined()
    expect(duty.topology).toBe(topology)
  })

  it('has a field for every value of the duty, and none for a value that does not exist', () => {
    const fields = [...inputFields(duty), ...form.fields(duty)]
    for (const { path } of fields) expect(valueAt({ requirement }, path), path).not.toBeUndefined()
    // A value that means something in one kind only has its field there.
    const otherwise = form.kinds(duty).flatMap((choice) => choice.choices.flatMap(({ value }) => {
      const changed = Object.entries(choice.write(String(value))).reduce<{ requirement: typeof requirement }>((tree, [place, entry]) => withValue(tree, place, entry), { requirement }).requirement.duty
      return formOf(changed).fields(changed)
    }))
    const places = [...fields, ...otherwise].map(({ path }) => path).concat(form.kinds(duty).map(({ place }) => place), 'requirement.duty.outputs', 'requirement.duty.topology', 'requirement.duty.supply')
    for (const key of Object.keys(duty)) expect(places.some((place) => place.startsWith(`requirement.duty.${key}`)), key).toBe(true)
  })

  it('has a column for every value of an output', () => {
    if (!form.outputs) return
    const [first] = (duty as Extract<Duty, { outputs: unknown }>).outputs
    expect(form.outputs.columns.map(({ field }) => field.path).sort()).toEqual(Object.keys(first!).filter((key) => key !== 'id').sort())
    expect(Object.keys(form.outputs.make('o2', 2)).sort()).toEqual(Object.keys(first!).sort())
  })

  it('keeps to the interface through every choice of kind', () => {
    const choices = [...form.kinds(duty), ...(supplyChoice(requirement) ? [supplyChoice(requirement)!] : [])]
    for (const choice of choices) {
      for (const { value } of choice.choices) {
        const changed = Object.entries(choice.write(String(value))).reduce<{ requirement: typeof requirement }>((tree, [place, entry]) => withValue(tree, place, entry), { requirement }).requirement
        expect(requirementSheetSchema.safeParse(changed).error, `${choice.label}: ${value}`).toBeUndefined()
        for (const { path } of [...inputFields(changed.duty), ...formOf(changed.duty).fields(changed.duty)]) expect(valueAt({ requirement: changed }, path), path).not.toBeUndefined()
      }
    }
  })

  it('names a unit beside every figure but ratios', () => {
    for (const field of form.fields(duty)) if (field.type === 'figure' && field.unit === '') expect(field.label).toMatch(/over|ratio|turns|times|number/i)
  })
})

it('every duty field has a place in words', () => {
  expect(new Set(Object.values(DUTY_FORMS).map(({ title }) => title)).size).toBe(DUTY_TOPOLOGIES.length)
  expect(allDutyFields().length).toBeGreaterThan(20)
})
