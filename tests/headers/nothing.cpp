// Empty on purpose: for headers that are included from the command line.
