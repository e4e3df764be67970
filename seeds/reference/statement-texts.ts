/**
 * What the signer of an entry states. A version is never edited: a change of words is a new version, and every signed
 * statement keeps the version that was read.
 */
export const STATEMENT_TEXTS = [
  {
    version: 1,
    locale: 'en',
    body: `I state to the best of my knowledge:

1. What this entry says about the animal, about the day and the way it came into human hands, and about the people named in it is true and complete.
2. If the animal was hunted, it was taken lawfully and in fair chase: it was wild and free, not held by a fence it could not leave, not drugged, and not taken from or with the help of an aircraft, a vehicle or electronic aids where these are barred. No case about its taking is open.
3. If the animal was found, killed on a road, handed over by an agency or inherited, it is lawfully possessed, and its papers are shown with this entry.
4. The antlers, horns or skull are those of one animal as it grew them. Nothing has been restored, filled, cast, added or altered.
5. The registry may examine the head again, may correct or strike the record if a statement here proves to be false, and may publish the score, the sheet, the class, the district, the method, the year and the hunter's name in the form chosen in this entry.

I have read this statement and sign it with my name.`,
  },
] as const
