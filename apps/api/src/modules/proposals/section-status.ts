import type { ProposalState, SectionStatus } from '@faintward/contracts/proposals';
import { CASE_SECTIONS } from './case-sections.js';
import type { ProposalFacts } from './proposal-facts.read-model.js';

/** The chain at the head of a proposal: what each section holds, and what it still lacks. */
export function sectionStatuses(facts: ProposalFacts, state: ProposalState, submissionCount: number): SectionStatus[] {
  const lacks = lackingBySection(facts);
  const status = (section: SectionStatus['section'], summary: string, isComplete: boolean): SectionStatus => {
    const lacking = lacks.find((lack) => lack.section === section);
    return {
      section,
      summary: lacking?.text ?? summary,
      isComplete: isComplete && lacking === undefined,
      isLacking: lacking !== undefined,
    };
  };
  const { dark, grey, bright } = facts.requestedHours;
  const words = CASE_SECTIONS.reduce((sum, { sectionId }) => sum + facts.wordCounts[sectionId], 0);
  const openCount = lacks.length;
  return [
    status('targets', counted(facts.targetCount, 'target'), facts.targetCount > 0),
    status('exposures', counted(facts.observationCount, 'observation'), facts.observationCount > 0),
    status('time', `${hours(dark + grey + bright)} h`, dark + grey + bright > 0),
    status('case', counted(words, 'word'), words > 0),
    status('team', teamSummary(facts), facts.unsignedCount === 0),
    {
      section: 'submit',
      summary: submitSummary(state, submissionCount, openCount),
      isComplete: state !== 'draft' && state !== 'withdrawn',
      isLacking: state === 'draft' && openCount > 0,
    },
  ];
}

/** What keeps a proposal from being submitted, in the order of the chain, for the list of proposals. */
export function lackingTexts(facts: ProposalFacts): string[] {
  return lackingBySection(facts).map(({ text }) => text);
}

function lackingBySection(facts: ProposalFacts): { section: SectionStatus['section']; text: string }[] {
  const lacks: { section: SectionStatus['section']; text: string }[] = [];
  const { targetCount, observationCount, requestedHours } = facts;
  if (targetCount === 0) lacks.push({ section: 'targets', text: 'no targets yet' });
  else if (facts.withoutBrightnessCount > 0) {
    lacks.push({ section: 'targets', text: `${facts.withoutBrightnessCount} of ${targetCount} without brightness` });
  }
  if (targetCount > 0 && observationCount === 0) lacks.push({ section: 'exposures', text: 'no observations yet' });
  else if (facts.withoutObservationCount > 0 && targetCount > 0) {
    lacks.push({
      section: 'exposures',
      text: `${facts.withoutObservationCount} of ${counted(targetCount, 'target')} without observation`,
    });
  } else if (facts.infeasibleCount + facts.lackingCount > 0) {
    lacks.push({
      section: 'exposures',
      text: `${facts.infeasibleCount + facts.lackingCount} of ${counted(observationCount, 'observation')} without a time`,
    });
  }
  if (observationCount > 0 && requestedHours.dark + requestedHours.grey + requestedHours.bright === 0) {
    lacks.push({ section: 'time', text: 'no hours yet' });
  }
  const unwritten = CASE_SECTIONS.filter(
    ({ isRequired, sectionId }) => isRequired && facts.wordCounts[sectionId] === 0,
  );
  const tooLong = CASE_SECTIONS.filter(({ sectionId, wordLimit }) => facts.wordCounts[sectionId] > wordLimit);
  if (unwritten.length > 0)
    lacks.push({ section: 'case', text: `${unwritten.map(({ title }) => title).join(' and ')} empty` });
  else if (tooLong.length > 0)
    lacks.push({ section: 'case', text: `${tooLong.map(({ title }) => title).join(' and ')} too long` });
  return lacks;
}

function teamSummary({ memberCount, unsignedCount }: ProposalFacts): string {
  if (unsignedCount > 0) return `${unsignedCount} of ${memberCount} unsigned`;
  return memberCount === 1 ? '1 person' : `${memberCount} people`;
}

function submitSummary(state: ProposalState, submissionCount: number, openCount: number): string {
  if (state === 'withdrawn') return 'withdrawn';
  if (state !== 'draft') return submissionCount > 1 ? `submitted ${submissionCount} times` : 'submitted';
  return openCount === 0 ? 'ready to submit' : `${openCount} to settle`;
}

function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}

function hours(value: number): string {
  return value.toFixed(value < 10 ? 1 : 0);
}
