// Package study turns the questions of a case into answers.
//
// A Model is a case with its network, built once; Poles, Tables, Limits, Check,
// Hand and Page each answer one question from it, as plain structs whose JSON is
// the command's. All numbers are SI: temperatures in K, pressures in Pa as the
// case states them, flows in W or m³/s, times in s. What is unknown or
// meaningless is absent, never null, 0 or NaN. Doubts travel in the answer as
// Warnings; an error means that there is no answer.
//
// Nothing here knows physics or text formats: elements come from a domain
// through package casefile, equations from package network, poles, responses
// and guaranteed roots from package laplace. Not here yet: anything that is not
// linear between the steps of its numbers.
package study
