import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import { GET } from '@/app/api/units/[unitId]/review/csv/route'
import { GET as readRoute } from '@/app/api/units/[unitId]/review/route'
import { exportReviewCsv } from '@/lib/services/review/export-csv'
import { readReview } from '@/lib/services/review/read'
import { MEASURE_DEFINITIONS, REVIEW_MEASURES } from '@/lib/weaning/course/measure-definitions'
import { auditRows, makeCtx, makeWorld, NOW } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'

function exported(measure: (typeof REVIEW_MEASURES)[number], world = makeWorld()) {
  const input = { unitId: world.medical.unit.id, measure, from: '2026-01', to: undefined }
  const csv = exportReviewCsv(makeCtx(world.db, world.lead), input)
  const rows = Papa.parse<string[]>(csv.text.replace('\ufeff', ''), { skipEmptyLines: false }).data
  return { world, csv, rows }
}

describe('exporting a measure', () => {
  it('gives a row for each month, with numbers as the page counts them', () => {
    const { csv, rows, world } = exported('utilisation')
    const review = readReview(makeCtx(world.db, world.lead), { unitId: world.medical.unit.id, from: '2026-01', to: undefined })
    expect(csv.fileName).toBe('utilisation-2026-01-to-2026-03.csv')
    expect(rows.slice(0, 4)).toEqual([
      ['Month', 'Status', 'Ventilator days', 'Patient days', 'Ratio'],
      ['2026-01', 'final', '0', '0', ''],
      ['2026-02', 'final', '0', '1', '0.0000'],
      ['2026-03', 'unfinished', '3', '3', '1.0000'],
    ])
    expect(review.months.map(({ patientDays }) => String(patientDays))).toEqual(rows.slice(1, 4).map((row) => row[3]))
  })
  it.each(REVIEW_MEASURES)('says below the months of %s how it is counted', (measure) => {
    const { rows } = exported(measure)
    const { title, numerator, denominator, exclusions } = MEASURE_DEFINITIONS[measure]
    const told = new Map(rows.map(([name = '', text = '']) => [name, text]))
    expect(told.get('Measure')).toBe(title)
    expect(told.get(denominator === null ? 'What is counted' : 'Numerator')).toBe(numerator)
    expect(told.get('Denominator')).toBe(denominator ?? undefined)
    expect(rows.filter(([name]) => name === 'Not counted').map(([, text]) => text)).toEqual(exclusions)
  })
  it('cannot be read as a formula, whatever a unit is called', () => {
    const world = makeWorld()
    world.db.$client.prepare('update units set name = ?').run('=HYPERLINK("x")')
    const { rows } = exported('trials', world)
    expect(rows.find(([name]) => name === 'Unit')?.[1]).toBe(`'=HYPERLINK("x")`)
  })
  it('is written into the audit log, once for each time', () => {
    const { world } = exported('screens')
    const [row, ...others] = auditRows(world.db, 'review.export')
    expect(others).toEqual([])
    expect(row).toMatchObject({
      unitId: world.medical.unit.id,
      actorId: world.lead.id,
      at: NOW,
      after: { measure: 'screens', from: '2026-01', to: '2026-03' },
    })
  })
  it.each(['rt', 'nurse'] as const)('is refused to the %s and then leaves no export in the audit log', (role) => {
    const world = makeWorld()
    const input = { unitId: world.medical.unit.id, measure: 'screens' as const, from: undefined, to: undefined }
    expect(() => exportReviewCsv(makeCtx(world.db, world[role]), input)).toThrow(/role cannot/)
    expect(auditRows(world.db, 'review.export')).toEqual([])
  })
  it('is not found for another unit', () => {
    const world = makeWorld()
    const input = { unitId: world.surgical.unit.id, measure: 'screens' as const, from: undefined, to: undefined }
    expect(() => exportReviewCsv(makeCtx(world.db, world.lead), input)).toThrow(/Not found/)
  })
})

describe('the routes', () => {
  const asked = async (handler: typeof GET, query: string, who: 'lead' | 'nurse' | 'outsider' | null = 'lead') => {
    const world = makeWorld()
    serveDatabase(world.db)
    const cookie = who === null ? {} : { cookie: makeSession(world.db, world[who].id).cookie }
    return handler(makeRequest(`/api/x${query}`, { method: 'GET', ...cookie }), routeParams({ unitId: world.medical.unit.id }))
  }
  it('send the file as CSV that no cache keeps', async () => {
    const response = await asked(GET, '?measure=ventilator_days')
    expect(response.status).toBe(200)
    expect(response.headers.get('content-type')).toBe('text/csv; charset=utf-8')
    expect(response.headers.get('cache-control')).toBe('no-store')
    expect(response.headers.get('content-disposition')).toMatch(
      /^attachment; filename="ventilator-days-\d{4}-\d{2}-to-\d{4}-\d{2}\.csv"$/,
    )
    expect([...new Uint8Array(await response.arrayBuffer()).slice(0, 3)]).toEqual([0xef, 0xbb, 0xbf])
  })
  it('send the months as JSON', async () => {
    const response = await asked(readRoute, '')
    expect(((await response.json()) as { months: unknown[] }).months).toHaveLength(24)
  })
  it.each([
    ['?measure=mortality', 422],
    ['', 422],
    ['?measure=screens&from=2026-13', 422],
    ['?measure=screens&from=2999-01&to=2999-02', 422],
  ])('refuse %s', async (query, status) => {
    expect((await asked(GET, query)).status).toBe(status)
  })
  it('refuse without a session, the wrong role and another unit', async () => {
    expect((await asked(GET, '?measure=screens', null)).status).toBe(401)
    expect((await asked(GET, '?measure=screens', 'nurse')).status).toBe(403)
    expect((await asked(GET, '?measure=screens', 'outsider')).status).toBe(404)
    expect((await asked(readRoute, '', 'outsider')).status).toBe(404)
  })
})
