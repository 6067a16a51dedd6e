package org.merewarden.account;

/** What a person is in the office; each account has exactly one. */
public enum Role {
    CLERK,
    BIOLOGIST,
    APPROVER,
    ADMINISTRATOR
}
