import type { GoalTopic } from './adviceFacts.ts'

/**
 * Words by which a goal's activity names what it is about. A goal is free text, so this is a reading aid only: it may
 * offer advice, and a therapist picks. Cutting counts as scissor work when paper or scissors are named: food is not.
 */
const topicWords: Record<GoalTopic, RegExp> = {
  handwriting: /\b(?:hand)?writ(?:e|es|er|ing|ten)\b/i,
  speed: /\b(?:speed|fast(?:er)?|quick(?:er|ly)?|keep(?:s|ing)? up|in time)\b/i,
  pain: /\b(?:pain(?:s|ful|less)?|hurt(?:s|ing)?|ach(?:e|es|ing)|sore)\b/i,
  scissors:
    /\b(?:scissors?|cut(?:s|ting)? (?:out|along|round|around)|cut(?:s|ting)?\b[^.;]{0,30}\b(?:paper|card|shapes?|circles?|lines?))\b/i,
  dressing:
    /\b(?:(?:un)?dress(?:es|ed|ing)?|button(?:s|ing)?|zip(?:s|ping)?|(?:shoe)?laces?|socks?|t(?:ie|ies|ying)\b[^.;]{0,20}\b(?:ties?|shoes?))\b/i,
  kitchen:
    /\b(?:kitchen|cook(?:s|ing)?|bak(?:e|es|ing)|peel(?:s|ing|er)?|sandwich(?:es)?|(?:tin|can) opener)\b/i,
  computer: /\b(?:computer|laptop|keyboard|typ(?:e|es|ing)|mouse)\b/i,
}

/** What a goal's activity is about, as far as its own words say; empty when they do not. */
export const topicsOfGoal = (activity: string): GoalTopic[] =>
  (Object.keys(topicWords) as GoalTopic[]).filter((topic) => topicWords[topic].test(activity))
