/**
 * What a required field starts from: nothing. The schema refuses it until somebody answers, and no value is preset that could be taken
 * over unread. The one place where a form's starting values are looser than their type.
 */
export function notAnswered<Value>(): Value {
  return undefined as Value
}
