//go:build race

package casefile_test

// raceDetector tells that time and memory measured mean nothing.
const raceDetector = true
