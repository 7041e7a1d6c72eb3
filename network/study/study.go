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
// through package casefile, equations and marches from package network, poles,
// responses and guaranteed roots from package laplace.
//
// A linear case is answered in closed form. One that is not is marched for tables,
// limits and cycles, and linearised about a state for poles and frequencies; Linear
// and the answers named Both show how far the one is from the other. A march and a
// response answer the same questions: see answers.
package study
