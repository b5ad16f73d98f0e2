/**
 * Version of the numbers this engine gives, stored with every analysis. It rises whenever the same input may give another
 * number or verdict: the first figure when a model or a rule changes, the second when a check is added, the third for a mended fault.
 */
export const ENGINE_VERSION = '1.0.0'
