import type { CheckCode } from '#shared/domain/workflow/checks'
import type { Origin } from '#shared/domain/workflow/origins'
import type { DemoMeasurer, DemoPerson } from './people'
import type { DemoClass, DistrictCode } from './society'
import type { DemoSitting, Story } from './story'

/** Who plays in the scenes. */
export interface Players {
  readonly measurer: DemoMeasurer
  /** a measurer of the district other than the demo's */
  readonly near: DemoMeasurer
  readonly shop: DemoPerson
  readonly reviewer: DemoPerson
  readonly reviewer2: DemoPerson
  readonly judges: readonly DemoPerson[]
  readonly registrar: DemoPerson
  /** sits today */
  readonly open: DemoSitting
  /** sits in two or three weeks */
  readonly planned: DemoSitting
  /** sat last */
  readonly closed: DemoSitting & { readonly daysAgo: number }
  /** a day in so many days, as the database writes it */
  readonly inDays: (days: number) => string
}

export interface Scene {
  readonly category: DemoClass
  readonly district: DistrictCode
  /** whose entry it is: the demo's entrant, somebody else, or nobody's yet */
  readonly owner: 'entrant' | 'other' | 'nobody'
  /** days ago on which it began, and on which the animal was taken at the latest */
  readonly begun: number
  readonly taken: number
  readonly origin?: Origin
  /** net over the minimum, as a share; `top` would be among the first of its class */
  readonly over?: number | 'top'
  /** the readings are those of a record that stands already: somebody entered a head twice */
  readonly twice?: true
  /** begun and left: neither method nor sex nor guide is said yet */
  readonly bare?: true
  readonly tell: (story: Story, players: Players) => void
}

const ALMOST: readonly CheckCode[] = ['sheet', 'photographs', 'statement', 'people']
const ALL_HUNTED: readonly CheckCode[] = ['sheet', 'photographs', 'tag_or_licence', 'statement', 'people', 'date_and_district', 'method', 'doubles', 'eligibility']

const BLURRED = { text: 'The photograph from the left is blurred. Please send a sharp one.', wants: ['photo_left'] }
const NO_TAG = { text: 'We cannot read the number on the tag. Please send a copy in which it can be read.', wants: ['tag_or_licence'] }
const WHICH_DAY = { text: 'The tag and the entry name different days. Which is right?', wants: ['takenOn'] }

const before = (story: Story, players: Players, sentIn: number, reviewer: DemoPerson, panel: number, measurer = players.near) =>
  story.begin().askMeasurer(sentIn + 22, measurer).certify(sentIn + 12, measurer).sendIn(sentIn).check(panel, reviewer, ALL_HUNTED)

/** Entries in every state that is not yet a record, as a working office has them on an ordinary day. */
export const SCENES: readonly Scene[] = [
  // at home
  { category: 'mule-deer-typical', district: 'juniper-fork', owner: 'entrant', begun: 2, taken: 24, tell: story => story.begin() },
  { category: 'pronghorn', district: 'quillan-flats', owner: 'entrant', begun: 9, taken: 70, bare: true, tell: story => story.begin() },
  { category: 'elk-typical', district: 'coldiron', owner: 'other', begun: 40, taken: 60, tell: story => story.begin() },
  { category: 'whitetail-typical', district: 'brackwater', owner: 'nobody', begun: 1, taken: 12, tell: (story, p) => story.beginFor(p.shop) },
  { category: 'mule-deer-nontypical', district: 'hollowmarch', owner: 'nobody', begun: 5, taken: 30, tell: (story, p) => story.beginFor(p.shop) },
  { category: 'black-bear', district: 'varrowmere', owner: 'nobody', begun: 16, taken: 41, tell: (story, p) => story.beginFor(p.shop) },

  // on the bench
  { category: 'elk-typical', district: 'juniper-fork', owner: 'entrant', begun: 12, taken: 75, tell: (story, p) => story.begin().askMeasurer(8, p.measurer).openSheet(8, p.measurer, 'nothing') },
  { category: 'mule-deer-typical', district: 'juniper-fork', owner: 'other', begun: 20, taken: 80, tell: (story, p) => story.begin().askMeasurer(15, p.measurer).openSheet(1, p.measurer, 'half') },
  { category: 'whitetail-nontypical', district: 'larkmoor', owner: 'other', begun: 11, taken: 70, tell: (story, p) => story.begin().askMeasurer(6, p.measurer).openSheet(1, p.measurer, 'all') },
  { category: 'cougar', district: 'kestrelden', owner: 'other', begun: 4, taken: 300, tell: (story, p) => story.begin().askMeasurer(3, p.measurer).openSheet(3, p.measurer, 'nothing') },
  { category: 'pronghorn', district: 'juniper-fork', owner: 'other', begun: 18, taken: 30, tell: (story, p) => story.begin().askMeasurer(17, p.measurer).openSheet(17, p.measurer, 'nothing') },
  { category: 'moose', district: 'varrowmere', owner: 'other', begun: 21, taken: 90, tell: (story, p) => story.begin().askMeasurer(12, p.near).openSheet(12, p.near, 'half') },
  { category: 'bighorn-sheep', district: 'skarncliff', owner: 'other', begun: 9, taken: 85, tell: (story, p) => story.begin().askMeasurer(5, p.near).openSheet(5, p.near, 'nothing') },

  // measured and signed
  { category: 'mule-deer-typical', district: 'juniper-fork', owner: 'entrant', begun: 30, taken: 90, over: 0.09, tell: (story, p) => story.begin().askMeasurer(25, p.measurer).certify(10, p.measurer).papers(8, ['photo_field', 'tag_or_licence']) },
  { category: 'whitetail-typical', district: 'varrowmere', owner: 'other', begun: 60, taken: 130, tell: (story, p) => story.begin().askMeasurer(50, p.near).certify(40, p.near).papers(30, ['photo_left']).sign(30) },
  { category: 'elk-nontypical', district: 'skarncliff', owner: 'other', begun: 100, taken: 380, tell: (story, p) => story.begin().askMeasurer(95, p.near).certify(80, p.near) },
  { category: 'mountain-goat', district: 'skarncliff', owner: 'other', begun: 25, taken: 85, tell: (story, p) => story.begin().askMeasurer(20, p.near).certify(5, p.near).papers(3).sign(2) },
  { category: 'black-bear', district: 'alderfall', owner: 'other', begun: 22, taken: 80, over: -0.01, tell: (story, p) => story.begin().askMeasurer(18, p.near).certify(7, p.near) },

  // at the office
  { category: 'pronghorn', district: 'juniper-fork', owner: 'entrant', begun: 45, taken: 110, tell: (story, p) => story.begin().askMeasurer(38, p.near).certify(22, p.near).sendIn(6) },
  { category: 'mule-deer-typical', district: 'coldiron', owner: 'other', begun: 60, taken: 400, tell: (story, p) => story.begin().askMeasurer(55, p.near).certify(45, p.near).sendIn(33) },
  { category: 'elk-typical', district: 'elder-reach', owner: 'other', begun: 50, taken: 120, tell: (story, p) => story.begin().askMeasurer(44, p.near).certify(38, p.near).sendIn(21).check(10, p.reviewer, ALMOST) },
  { category: 'whitetail-typical', district: 'quillan-flats', owner: 'other', begun: 55, taken: 120, tell: (story, p) => story.begin().askMeasurer(50, p.near).certify(40, p.near).sendIn(17) },
  { category: 'moose', district: 'alderfall', owner: 'other', begun: 40, taken: 100, origin: 'found', tell: (story, p) => story.begin().askMeasurer(34, p.near).certify(28, p.near).sendIn(12) },
  { category: 'cougar', district: 'fennickshaw', owner: 'other', begun: 30, taken: 290, tell: (story, p) => story.begin().askMeasurer(26, p.near).certify(18, p.near).sendIn(9).check(3, p.reviewer2, ALL_HUNTED) },
  { category: 'bison', district: 'quillan-flats', owner: 'other', begun: 28, taken: 330, tell: (story, p) => story.begin().askMeasurer(24, p.near).certify(16, p.near).sendIn(5) },
  { category: 'mule-deer-nontypical', district: 'skarncliff', owner: 'other', begun: 26, taken: 360, twice: true, tell: (story, p) => story.begin().askMeasurer(20, p.near).certify(12, p.near).sendIn(2) },
  { category: 'grizzly-bear', district: 'alderfall', owner: 'other', begun: 120, taken: 200, tell: (story, p) => story.begin().askMeasurer(110, p.near).certify(98, p.near).sendIn(70)
    .declineIneligible(40, p.reviewer2, 'altered_parts', 'A tooth socket on the right was filled before the head was measured.')
    .appeal(14, 'The filling is bone cement of the preparator and lies outside both measuring places. A letter of the preparator is with the file.') },

  // sent back
  { category: 'whitetail-nontypical', district: 'hollowmarch', owner: 'entrant', begun: 70, taken: 400, tell: (story, p) => story.begin().askMeasurer(62, p.near).certify(52, p.near).sendIn(30).returnWith(8, p.reviewer, [BLURRED, NO_TAG]) },
  { category: 'elk-typical', district: 'alderfall', owner: 'other', begun: 130, taken: 430, tell: (story, p) => story.begin().askMeasurer(120, p.near).certify(110, p.near).sendIn(96).returnWith(78, p.reviewer, [NO_TAG]) },
  { category: 'pronghorn', district: 'larkmoor', owner: 'other', begun: 52, taken: 420, tell: (story, p) => story.begin().askMeasurer(46, p.near).certify(40, p.near).sendIn(31).returnWith(15, p.reviewer2, [WHICH_DAY, { ...BLURRED, answer: 'A new photograph is with the papers.' }]) },
  { category: 'mule-deer-typical', district: 'elder-reach', owner: 'other', begun: 110, taken: 460, tell: (story, p) => before(story, p, 88, p.reviewer, 80).putBeforePanel(79, p.reviewer, p.closed)
    .vote(p.closed.daysAgo, p.closed.judges[0]!, 'return', 'The skull plate cannot be seen whole.', ['Please send a photograph from below that shows the whole plate.'])
    .vote(p.closed.daysAgo, p.closed.judges[1]!, 'return', 'I would like to see the plate from below.', ['Please send a photograph from below.'])
    .vote(p.closed.daysAgo, p.closed.judges[2]!, 'accept')
    .decided(p.closed.daysAgo, 'return', null, 'The skull plate cannot be seen whole.', [{ text: 'Please send a photograph from below that shows the whole plate.', wants: ['other'] }]) },

  // came back
  { category: 'black-bear', district: 'brackwater', owner: 'other', begun: 90, taken: 400, tell: (story, p) => story.begin().askMeasurer(80, p.near).certify(66, p.near).sendIn(50).returnWith(40, p.reviewer, [{ ...NO_TAG, answer: 'Here it is, larger.' }]).resubmit(25) },

  // before the panel, on the docket of today
  { category: 'mule-deer-typical', district: 'kestrelden', owner: 'entrant', begun: 80, taken: 420, tell: (story, p) => before(story, p, 45, p.reviewer, 24).putBeforePanel(23, p.reviewer, p.open).openFile(4, p.judges[0]!, p.judges[2]!).vote(0.05, p.judges[2]!, 'accept') },
  { category: 'whitetail-typical', district: 'larkmoor', owner: 'other', begun: 82, taken: 410, tell: (story, p) => before(story, p, 46, p.reviewer2, 26).putBeforePanel(25, p.reviewer2, p.open).openFile(3, p.judges[1]!)
    .vote(0.06, p.judges[1]!, 'accept').vote(0.05, p.judges[2]!, 'return', 'The third circumference looks taken at the wrong place.', ['Please have the third circumference on the right taped again.']) },
  { category: 'elk-typical', district: 'coldiron', owner: 'other', begun: 85, taken: 440, tell: (story, p) => before(story, p, 50, p.reviewer, 27).putBeforePanel(26, p.reviewer, p.open).vote(0.06, p.judges[1]!, 'accept').vote(0.05, p.judges[2]!, 'accept').vote(0.04, p.judges[3]!, 'accept') },
  { category: 'cougar', district: 'elder-reach', owner: 'other', begun: 75, taken: 330, tell: (story, p) => before(story, p, 44, p.reviewer2, 22).putBeforePanel(21, p.reviewer2, p.open).vote(0.05, p.judges[4]!, 'stand_aside', 'The hunter is my neighbour.') },
  { category: 'pronghorn', district: 'otterstone', owner: 'other', begun: 78, taken: 440, tell: (story, p) => before(story, p, 42, p.reviewer, 20).putBeforePanel(19, p.reviewer, p.open) },

  // before the panel, for the next one
  { category: 'mountain-goat', district: 'skarncliff', owner: 'other', begun: 66, taken: 430, over: 'top', tell: (story, p) => before(story, p, 30, p.reviewer, 9).putBeforePanel(8, p.reviewer, p.planned, { pair: [p.judges[5]!, p.judges[6]!] }) },
  { category: 'moose', district: 'brackwater', owner: 'other', begun: 64, taken: 440, tell: (story, p) => before(story, p, 28, p.reviewer2, 8).putBeforePanel(7, p.reviewer2, p.planned) },
  { category: 'black-bear', district: 'coldiron', owner: 'other', begun: 60, taken: 420, tell: (story, p) => before(story, p, 27, p.reviewer, 7).putBeforePanel(6, p.reviewer, p.planned) },
  { category: 'whitetail-nontypical', district: 'thornwether', owner: 'other', begun: 150, taken: 500, tell: (story, p) => before(story, p, 100, p.reviewer, 85).putBeforePanel(84, p.reviewer, p.planned).hold(60, p.judges[0]!, 'A court has the taking of the animal before it.') },
  { category: 'bighorn-sheep', district: 'coldiron', owner: 'other', begun: 50, taken: 440, tell: (story, p) => before(story, p, 18, p.reviewer2, 3).putBeforePanel(2, p.reviewer2, null) },

  // measured a second time
  { category: 'elk-nontypical', district: 'elder-reach', owner: 'other', begun: 88, taken: 430, over: 'top', tell: (story, p) => before(story, p, 52, p.reviewer, 34).putBeforePanel(33, p.reviewer, p.planned, { pair: [p.judges[3]!, p.judges[4]!] }).orderRemeasure(12, p.judges[1]!, [p.judges[3]!, p.judges[4]!], p.inDays(6)) },
  { category: 'bison', district: 'otterstone', owner: 'other', begun: 86, taken: 400, over: 'top', tell: (story, p) => before(story, p, 49, p.reviewer2, 31).putBeforePanel(30, p.reviewer2, p.planned, { pair: [p.judges[2]!, p.judges[7]!] }).orderRemeasure(14, p.judges[1]!, [p.judges[2]!, p.judges[7]!], p.inDays(-2)) },

  // not accepted
  { category: 'mule-deer-typical', district: 'juniper-fork', owner: 'entrant', begun: 85, taken: 150, tell: (story, p) => story.begin().askMeasurer(76, p.near).certify(60, p.near).sendIn(40)
    .declineIneligible(11, p.reviewer2, 'split_skull', 'The photographs show a skull plate that was sawn and joined again, so the spread cannot be counted.') },
  { category: 'whitetail-typical', district: 'brackwater', owner: 'other', begun: 140, taken: 500, tell: (story, p) => before(story, p, 100, p.reviewer, 82).putBeforePanel(81, p.reviewer, p.closed)
    .vote(p.closed.daysAgo, p.closed.judges[0]!, 'decline', 'The deer came from behind a fence it could not leave.', null, 'captive')
    .vote(p.closed.daysAgo, p.closed.judges[1]!, 'decline', 'The account names the enclosure.', null, 'captive')
    .vote(p.closed.daysAgo, p.closed.judges[3]!, 'decline', 'Not a free animal.', null, 'captive')
    .decided(p.closed.daysAgo, 'decline', 'captive', 'The deer came from behind a fence it could not leave.') },
  { category: 'pronghorn', district: 'hollowmarch', owner: 'other', begun: 48, taken: 430, tell: (story, p) => story.begin().askMeasurer(42, p.near).certify(36, p.near).sendIn(29).declineIneligible(20, p.reviewer, 'outside_region', 'The tag was issued for a unit that lies outside the region.') },

  // nothing came back
  { category: 'elk-typical', district: 'fennickshaw', owner: 'entrant', begun: 160, taken: 460, tell: (story, p) => story.begin().askMeasurer(150, p.near).certify(140, p.near).lapse(49) },
  { category: 'mule-deer-nontypical', district: 'alderfall', owner: 'other', begun: 190, taken: 500, tell: (story, p) => story.begin().askMeasurer(180, p.near).certify(170, p.near).sendIn(150).returnWith(130, p.reviewer, [BLURRED]).lapse(39) },

  // taken back
  { category: 'moose', district: 'elder-reach', owner: 'other', begun: 70, taken: 420, tell: (story, p) => story.begin().askMeasurer(64, p.near).certify(50, p.near).withdraw(41) },
  { category: 'black-bear', district: 'skarncliff', owner: 'other', begun: 44, taken: 100, tell: story => story.begin().withdraw(30) },
]
