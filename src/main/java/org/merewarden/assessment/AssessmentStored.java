package org.merewarden.assessment;

/** Published in the transaction that stores an assessment. */
public record AssessmentStored(long stockId, long assessmentId) {}
