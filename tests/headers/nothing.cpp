// Empty on purpose: a header to be compiled alone is included from the command line.
