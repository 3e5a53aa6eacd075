/** Changes whenever a rule or threshold of findings, comparison or diagnosis changes; stored with every judgement. */
export const ENGINE_VERSION = "3";
