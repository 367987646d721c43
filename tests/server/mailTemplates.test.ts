import nodemailer from 'nodemailer'
import { simpleParser } from 'mailparser'
import { describe, expect, it } from 'vitest'
import {
  carerInvitation,
  deliveryFailed,
  letterAttached,
  letterNotice,
  passwordChanged,
  passwordReset,
  staffInvitation,
} from '../../server/mail/mailTemplates.ts'

const clinic = { clinicName: 'Old Tannery Children’s Clinic', clinicPhone: '01632 960 000' }
const link = 'https://clinic.example/letter/5f0c1c1e-0000-4000-8000-000000000001'
const worksFor = '14 days'

const mails = {
  letterNotice: letterNotice({ clinic, link, worksFor }),
  letterAttached: letterAttached({ clinic }),
  staffInvitation: staffInvitation({ clinic, link, worksFor, name: 'Ada Writer' }),
  carerInvitation: carerInvitation({ clinic, link, worksFor }),
  passwordReset: passwordReset({ clinic, link, worksFor }),
  passwordChanged: passwordChanged({ clinic, changedAt: '3 Mar 2026, 14:05' }),
  deliveryFailed: deliveryFailed({ clinic, link, problem: 'refused' }),
}
const all = Object.entries(mails)
const toFamilies = all.filter(([name]) => /^(letter|carer)/.test(name))

// Words that would tell somebody looking over a shoulder what the letter is about (our own list).
const clinicalWords =
  /\b(?:left|right|hand(?:s|ed|writing)?|writing|therap\w*|assess\w*|progress|goals?|diagnos\w*|child|son|daughter|school|questionnaire|sample|session|review|scissors|pain)\b/i

const visibleText = (html: string) => html.replace(/<[^>]+>/g, ' ')

const withoutClinic = (text: string) => text.replaceAll(clinic.clinicName, '')

describe.each(all)('%s', (_name, mail) => {
  it('has a subject of one short line, a text part and an HTML part', () => {
    expect(mail.subject).toMatch(/^[^\r\n]{5,80}$/)
    expect(mail.text.trim().length).toBeGreaterThan(80)
    expect(mail.html).toMatch(/^<!doctype html>/)
  })

  it('fetches nothing: no image, script, style sheet, form or frame', () => {
    expect(mail.html).not.toMatch(/<(?:img|script|link|iframe|form|object|svg|video|style)\b/i)
    expect(mail.html).not.toMatch(/url\(|src=/i)
  })

  it('names its language and has a title and one heading for screen readers', () => {
    expect(mail.html).toContain('<html lang="en-GB">')
    expect(mail.html.match(/<h1\b/g)).toHaveLength(1)
    expect(mail.html).toMatch(/<title>[^<]+<\/title>/)
  })

  it('says the same words in both parts', () => {
    const words = (text: string) => text.replace(/\s+/g, ' ')
    const plain = words(
      visibleText(mail.html.replace(/<title>[\s\S]*?<\/title>/, ''))
        .replaceAll('&#39;', "'")
        .replaceAll('&amp;', '&'),
    )
    for (const line of mail.text
      .split('\n\n')
      .filter((part) => !part.includes('http') && !part.startsWith('--'))) {
      expect(plain).toContain(words(line).trim())
    }
  })

  it('has no clinical word in the subject', () => {
    expect(withoutClinic(mail.subject)).not.toMatch(clinicalWords)
  })
})

describe.each(toFamilies)('%s', (_name, mail) => {
  it('gives away nothing about a child anywhere in it', () => {
    expect(withoutClinic(mail.text)).not.toMatch(clinicalWords)
    expect(withoutClinic(visibleText(mail.html))).not.toMatch(clinicalWords)
  })
})

describe('mail templates', () => {
  it('print nothing that they are not made to print, even when it is handed to them', () => {
    const canary = { childName: 'Canary Childname', recordNumber: 'FF-CANARY', reason: 'Canary reason' }
    const given = {
      clinic,
      link,
      worksFor,
      name: 'Ada Writer',
      changedAt: 'today',
      problem: 'gave_up' as const,
      ...canary,
    }
    const made = [
      letterNotice(given),
      letterAttached(given),
      staffInvitation(given),
      carerInvitation(given),
      passwordReset(given),
      passwordChanged(given),
      deliveryFailed(given),
    ]
    expect(made.filter((mail) => /canary/i.test(JSON.stringify(mail)))).toEqual([])
  })

  it.each([
    ['letterNotice', mails.letterNotice],
    ['staffInvitation', mails.staffInvitation],
    ['carerInvitation', mails.carerInvitation],
    ['passwordReset', mails.passwordReset],
    ['deliveryFailed', mails.deliveryFailed],
  ])('gives the link of %s in both parts, in the open', (_name, mail) => {
    expect(mail.text).toContain(`\n${link}\n`)
    expect(mail.html).toContain(`href="${link}"`)
    expect(mail.html).toContain(`>${link}<`)
  })

  it('puts no link into the notice that a password was changed', () => {
    expect(mails.passwordChanged.text).not.toContain('http')
    expect(mails.passwordChanged.html).not.toContain('href')
  })

  it('keeps a line break in the clinic’s name out of the subject', () => {
    const odd = { ...clinic, clinicName: 'Clinic\r\nBcc: thief@example.org' }
    expect(letterNotice({ clinic: odd, link, worksFor }).subject).toBe(
      'You have a letter from Clinic Bcc: thief@example.org',
    )
  })

  it('shows markup in a name as text', () => {
    const { html } = staffInvitation({ clinic, link, worksFor, name: '<script>alert("x")</script> & Co' })
    expect(html).not.toContain('<script')
    expect(html).toContain('&lt;script&gt;alert(&quot;x&quot;)&lt;/script&gt; &amp; Co')
  })

  it('keeps its text and accents through MIME and back', async () => {
    const mail = letterNotice({ clinic, link, worksFor })
    const transport = nodemailer.createTransport({ streamTransport: true, buffer: true })
    const { message } = await transport.sendMail({
      from: 'a@clinic.example',
      to: 'b@family.example',
      ...mail,
    })
    const read = await simpleParser(message as Buffer)
    expect(read.subject).toBe(mail.subject)
    expect(read.text?.trim()).toBe(mail.text.trim())
    expect(read.html).toContain('Old Tannery Children’s Clinic')
    expect(read.attachments).toEqual([])
  })
})
