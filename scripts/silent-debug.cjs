// In place of `debug`, which a numerical library calls and which would bring a terminal's colours
// into a program that must run anywhere: it prints nothing.
module.exports = () => () => undefined;
