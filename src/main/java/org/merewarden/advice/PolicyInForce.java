package org.merewarden.advice;

import org.merewarden.core.policy.Policy;

/** The office's written rule in the version that was adopted last. Every call is one statement. */
public interface PolicyInForce {
    Policy policy();

    /** The version's number, from 1. */
    int number();
}
