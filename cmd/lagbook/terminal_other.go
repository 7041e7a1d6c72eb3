//go:build !unix

package main

import "os"

// terminalWidth is 0: how to ask is not known here.
func terminalWidth(*os.File) int { return 0 }
