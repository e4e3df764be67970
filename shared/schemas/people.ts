import { z } from 'zod'
import type { STAFF_ROLES } from '#shared/domain/access/roles'
import { ROLES } from '#shared/domain/access/roles'

/** Roles that a registrar gives and takes; every account is an entrant. */
export const GIVEN_ROLES = ROLES.filter(role => role !== 'entrant')

export const PASSWORD_LEAST = 10
export const PASSWORD_MOST = 200

/** Letters of every script are taken; nothing that could end a header, and one @. */
const EMAIL = /^[^\s@"<>(),:;\\[\]\p{C}]{1,64}@[^\s@"<>(),:;\\[\]\p{C}]+\.[^\s@"<>(),:;\\[\]\p{C}.]{2,}$/u

/** One spelling for one mailbox: composed letters, small. Accents stay, since they make another mailbox. */
export function normalEmail(text: string): string {
  return text.trim().normalize('NFC').toLowerCase()
}

export const emailField = z.string().transform(normalEmail).pipe(
  z.string().min(1).max(254).refine(value => EMAIL.test(value), { params: { code: 'email' } }),
)

export const nameField = z.string().transform(text => text.normalize('NFC').replace(/[\p{Cc}\p{Cf}]/gu, '').replace(/\s+/gu, ' ').trim()).pipe(z.string().min(1).max(120))

/** A password that is being set. Length counts, kinds of letters do not (NIST SP 800-63B, 3.1.1.2). */
export const newPasswordField = z.string().min(PASSWORD_LEAST).max(PASSWORD_MOST)

/** A password that is being checked: whatever was typed. */
const passwordField = z.string().min(1).max(1000)
const codeField = z.string().max(40).optional()
const proof = { password: passwordField, code: codeField }

export const signUpSchema = z.object({ name: nameField, email: emailField, password: newPasswordField })
export const emailOnlySchema = z.object({ email: emailField })
export const linkSchema = z.object({ token: z.string().min(1).max(200) })
export const confirmSchema = z.object({ token: z.string().min(1).max(200), password: z.string().max(1000).optional() })
export const resetSchema = z.object({ token: z.string().min(1).max(200), password: newPasswordField })
export const acceptInviteSchema = z.object({ token: z.string().min(1).max(200), name: nameField, password: newPasswordField })

const optionalText = (most: number) => z.string().transform(text => text.trim()).pipe(z.string().max(most)).transform(text => text || null).nullable()

export const profileSchema = z.object({
  name: nameField,
  phone: optionalText(40),
  address: optionalText(300),
  shopName: optionalText(120),
  district: z.string().max(60).nullable().transform(code => code || null),
  printName: z.enum(['full', 'initials', 'withheld']),
})

export const proofSchema = z.object(proof)
export const changePasswordSchema = z.object({ ...proof, newPassword: newPasswordField })
export const changeEmailSchema = z.object({ ...proof, email: emailField })
export const enableFactorSchema = z.object({ code: z.string().min(1).max(40) })

export const idParams = z.object({ id: z.uuid() })

const givenRole = z.enum(GIVEN_ROLES as [string, ...string[]]).transform(role => role as (typeof STAFF_ROLES)[number] | 'shop')
export const inviteSchema = z.object({ name: nameField, email: emailField, role: z.preprocess(value => (value === '' ? null : value), givenRole.nullable()), ...proof })
export const roleSchema = z.object({ role: givenRole, ...proof })
export const roleParams = z.object({ id: z.uuid(), role: givenRole })
export const decisionSchema = z.object({ decision: z.enum(['grant', 'refuse', 'withdraw']), ...proof })

const day = z.iso.date()
const accreditation = { validFrom: day, validTo: day, species: z.array(z.string().max(40)).min(1).max(100) }
const inOrder = (value: { validFrom: string, validTo: string }) => value.validFrom <= value.validTo
const spanError = { path: ['validTo'], params: { code: 'before_start' } }
export const accreditSchema = z.object({ number: z.string().transform(text => text.trim()).pipe(z.string().min(1).max(20).regex(/^[\x21-\x7e]+$/)), ...accreditation }).refine(inOrder, spanError)
export const accreditationChangeSchema = z.object({ ...accreditation, suspended: z.boolean() }).refine(inOrder, spanError)

export const peopleQuery = z.object({
  q: z.string().max(120).optional(),
  role: z.enum(ROLES).optional(),
  state: z.enum(['active', 'invited', 'closed']).optional(),
  cursor: z.string().max(400).optional(),
})
