import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '@/db/client'
import { openTestDatabase } from '../helpers/database'

let db: Db
const run = (sql: string) => () => db.$client.exec(sql)

beforeEach(() => {
  db = openTestDatabase()
  db.$client.exec(`
    insert into hospitals (id, name, created_at) values ('h', 'Invented', 1);
    insert into units (id, hospital_id, name, time_zone, created_at) values ('u', 'h', 'Unit', 'Etc/UTC', 1);
    insert into beds (id, unit_id, label, sort_order, created_at) values ('b1', 'u', '01', 1, 1), ('b2', 'u', '02', 2, 1);
    insert into user (id, name, email) values ('p', 'Person', 'person@example.invalid');
    insert into people (id, hospital_id, name, created_at) values ('p', 'h', 'Person', 1);
    insert into patients (id, hospital_id, record_number, family_name, given_name, created_at, created_by)
      values ('one', 'h', '1', 'Family', 'Given', 1, 'p'), ('two', 'h', '2', 'Family', 'Given', 1, 'p');
  `)
})

const stay = (id: string, patient: string, bed: string, startedAt: number, endedAt: number | 'null') =>
  run(
    `insert into stays (id, patient_id, unit_id, bed_id, started_at, ended_at) values ('${id}', '${patient}', 'u', '${bed}', ${startedAt}, ${endedAt})`,
  )

describe('stays', () => {
  it('a patient is in one bed at a time', () => {
    stay('s1', 'one', 'b1', 10, 'null')()
    expect(stay('s2', 'one', 'b2', 20, 'null')).toThrow('UNIQUE constraint failed: stays.patient_id')
  })

  it('a bed holds one patient at a time', () => {
    stay('s1', 'one', 'b1', 10, 'null')()
    expect(stay('s2', 'two', 'b1', 20, 'null')).toThrow('UNIQUE constraint failed: stays.bed_id')
  })

  it('patient and bed are free again after the stay', () => {
    stay('s1', 'one', 'b1', 10, 20)()
    stay('s2', 'one', 'b2', 20, 'null')()
    stay('s3', 'two', 'b1', 20, 'null')()
    expect(db.$client.prepare('select count(*) from stays').pluck().get()).toBe(3)
  })

  it('a stay does not end before it began', () => {
    expect(stay('s1', 'one', 'b1', 10, 9)).toThrow('CHECK constraint failed: stays_order')
    stay('s1', 'one', 'b1', 10, 10)()
  })
})

const episode = (id: string, patient: string, startedAt: number, endedAt: number | 'null') =>
  run(`insert into episodes (id, patient_id, started_at, start, airway, ended_at, recorded_at, recorded_by)
    values ('${id}', '${patient}', ${startedAt}, 'intubated_here', 'endotracheal_tube', ${endedAt}, 1, 'p')`)

describe('episodes', () => {
  it('a patient has one open episode at a time', () => {
    episode('e1', 'one', 10, 'null')()
    expect(episode('e2', 'one', 20, 'null')).toThrow('UNIQUE constraint failed: episodes.patient_id')
    episode('e3', 'two', 20, 'null')()
  })

  it('a reintubation begins the next episode', () => {
    episode('e1', 'one', 10, 20)()
    episode('e2', 'one', 30, 'null')()
    expect(db.$client.prepare('select count(*) from episodes').pluck().get()).toBe(2)
  })

  it('an episode does not end before it began', () => {
    expect(episode('e1', 'one', 10, 9)).toThrow('CHECK constraint failed: episodes_order')
  })
})

describe('other rules of the tables', () => {
  it('a record number stands once in a hospital', () => {
    const again = `insert into patients (id, hospital_id, record_number, family_name, given_name, created_at, created_by)
      values ('three', 'h', '1', 'Family', 'Given', 1, 'p')`
    expect(run(again)).toThrow('UNIQUE constraint failed: patients.hospital_id, patients.record_number')
  })

  it.each([0, 241])('an idle lock of %i minutes is refused', (minutes) => {
    expect(run(`update hospitals set idle_lock_min = ${minutes}`)).toThrow('CHECK constraint failed: hospitals_idle_lock')
  })

  it('a patient with records cannot be deleted', () => {
    episode('e1', 'one', 10, 'null')()
    expect(run(`delete from patients where id = 'one'`)).toThrow('FOREIGN KEY constraint failed')
  })
})
