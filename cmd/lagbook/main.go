// Command lagbook reads a case of thermal or hydraulic resistances, capacitances
// and inertances and answers from its poles: how slow, how hot, how much pressure,
// when, and whether the limits hold.
//
//	lagbook VERB [CASE.toml] [flags]
//
// Each verb has a file of its own here, which reads the case, asks package
// study and hands the answer to package present; nothing is computed here.
// Results go to standard output, everything else to standard error. Exit
// status: 0 done, 1 the case cannot be read or computed, 2 wrong usage, 3 a
// limit is not met, 130 interrupted.
package main

import "os"

func main() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) }
