package org.merewarden.intake;

/** A file as it came. */
record Upload(String fileName, byte[] content) {}
