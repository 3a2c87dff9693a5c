import { composeMessage, type Message } from './message'

const CLINICAL_FOOTER =
  'Daybreath supports licensed clinicians; local protocol and orders come first. This message names no patient; the record is behind the link.'
const ACCOUNT_FOOTER = 'If you did not expect this message, leave it unused and tell your administrator.'

const plural = (count: number, one: string, many: string) => `${count} ${count === 1 ? one : many}`

export type BedLine = { bedLabel: string; what: string }

/** The morning list of beds due for screening, to the RT team. */
export function morningDueMessage(data: {
  unitName: string
  dayText: string
  windowText: string
  beds: BedLine[]
  url: string
}): Message {
  return composeMessage({
    subject: `${data.unitName}: ${plural(data.beds.length, 'screen', 'screens')} due, ${data.dayText}`,
    lead: `${plural(data.beds.length, 'patient is', 'patients are')} due for the daily screen in ${data.unitName} today, ${data.windowText}.`,
    lines: data.beds.map(({ bedLabel, what }) => `${bedLabel}: ${what}`),
    link: { label: 'Open Today', url: data.url },
    footer: CLINICAL_FOOTER,
  })
}

/** Still unscreened when the window closed, to the RT team and the unit lead. */
export function windowEndMessage(data: {
  unitName: string
  dayText: string
  closedText: string
  beds: BedLine[]
  url: string
}): Message {
  return composeMessage({
    subject: `${data.unitName}: ${plural(data.beds.length, 'patient', 'patients')} not screened by ${data.closedText}, ${data.dayText}`,
    lead: `The screening window of ${data.unitName} closed at ${data.closedText}. Without a complete screen:`,
    lines: data.beds.map(({ bedLabel, what }) => `${bedLabel}: ${what}`),
    link: { label: 'Open Today', url: data.url },
    footer: CLINICAL_FOOTER,
  })
}

/** A passed trial without a decision, to the physicians of the unit. */
export function decisionOwedMessage(data: {
  unitName: string
  bedLabel: string
  passedText: string
  dayText: string
  url: string
}): Message {
  return composeMessage({
    subject: `${data.unitName}: decision owed, bed ${data.bedLabel}, ${data.dayText}`,
    lead: `Bed ${data.bedLabel} in ${data.unitName}: the breathing trial was recorded as passed at ${data.passedText}, and no decision has been signed yet.`,
    lines: [],
    link: { label: 'Open Today', url: data.url },
    footer: CLINICAL_FOOTER,
  })
}

/** Someone from outside the unit opened a record, to the unit leads. */
export function recordOpenedMessage(data: { unitName: string; bedLabel: string; url: string }): Message {
  return composeMessage({
    subject: `${data.unitName}: a record was opened from outside the unit, bed ${data.bedLabel}`,
    lead: `Someone outside ${data.unitName} opened the record of bed ${data.bedLabel} and gave a reason. Who, why and until when stands on the page.`,
    lines: [],
    link: { label: 'See who opened it', url: data.url },
    footer: CLINICAL_FOOTER,
  })
}

/** Invitation to set a password. */
export function invitationMessage(data: { url: string }): Message {
  return composeMessage({
    subject: 'Your Daybreath account: choose a password',
    lead: 'An administrator has made a Daybreath account for you. The link below works once, for 7 days.',
    lines: [],
    link: { label: 'Choose a password', url: data.url },
    footer: ACCOUNT_FOOTER,
  })
}

/** Link to a new password. */
export function passwordResetMessage(data: { url: string }): Message {
  return composeMessage({
    subject: 'Daybreath: choose a new password',
    lead: 'Someone asked for a new password for your Daybreath account. The link below works once, for 1 hour.',
    lines: [],
    link: { label: 'Choose a new password', url: data.url },
    footer: ACCOUNT_FOOTER,
  })
}
