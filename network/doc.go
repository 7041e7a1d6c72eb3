// Package network holds linear networks of stores that exchange something: heat
// between bodies, volume between tanks. It knows nodes and branches, no physics
// and no file.
//
// A node has a level x (a temperature, a pressure). It is one of three kinds:
//
//	store     has a capacity C > 0; C·x' is the sum of what flows in
//	held      its level is an input u(t); a capacity of its own counts only in what its
//	          driver delivers into it
//	massless  neither: what flows in sums to zero at every instant
//
// Into the balance of a node, positive into the node, go
//
//	resistance   G·(x_from − x_to) out of from and into to      G > 0
//	one way      W·(x_from − x_to) into to, nothing from from   W ≥ 0, a stream
//	feedback     K·(x_on − About) into its node                 K of any sign
//	source       sign·u(t)
//	inertance    its flow i, a state: L·i' = x_from − x_to − LR·i   L > 0, LR ≥ 0
//
// A branch's flow is positive from its first-named end to its second. Numbers
// are in units of the caller's choice, SI where they come from a case file:
//
//	            level   capacity  flow   conductance G, W, K  time
//	thermal     K       J/K       W      W/K                  s
//	hydraulic   Pa      m³/Pa     m³/s   m³/(s·Pa)            s
//
// The way through the package: a Builder takes the graph and Build returns it as
// a Network with a plan, once; NewParams are the numbers, set many times; Reduce
// turns both into a laplace.System whose states are the stores and whose outputs
// are the levels and flows asked for; Respond answers in real levels against time.
//
// Massless nodes are eliminated exactly, never by a small made-up capacity: each
// is replaced by the mesh of its neighbours (Kron 1939; the star–mesh transform),
// in an order that keeps the mesh small (Markowitz 1957). The balances are kept
// in the exchange form F_ij·(x_j − x_i), the diagonal is never formed, and without
// feedback no subtraction occurs, so that every exchange is accurate to a few
// roundings however stiff the network is (Grassmann, Taksar, Heyman 1985; Alfa,
// Xue, Ye 2002). The steady state comes from the same elimination carried on
// through the stores. A feedback can make the pivot of a massless node zero or
// negative: then no answer exists, or not the limit of one with a small capacity,
// and the node is named in a fault.
//
// Answers are formed in deviations from the start state, so that what does not
// change keeps all its digits: y(t) = y(start) + response to u − u(0⁻) + response
// to the start's imbalance, which is exactly zero where the start is steady.
//
// Where inertances meet at massless nodes that no resistance ties to the rest, a
// joint, their flows sum to what sources bring, and as many of them depend on the
// others as there are joints: a spanning tree of the graph says which, with whole
// numbers and no test of size. The others are states, with an inertance matrix where
// they share a dependent one. A source that changes at a joint pushes the flows at
// once and makes the joint's level follow its derivative: the level is improper, as is
// what must be delivered into a held node to hold it where that node stores. Their
// transfer functions are right, and a response leaves out the impulses at jumps, which
// laplace.Response.Impulses lists. A loop of inertances without resistance carries a
// flow round it for ever: its pole is exactly 0.
//
// An inertance can be shut (Params.Shut): its state is gone while it is, its flow is 0
// from the instant on at which it is shut and begins again from 0. The same becomes of
// those that have no way on but what is shut; where others meet there, they keep the
// momentum they have together (carry.go). The impulse of level that this takes at the
// shut end is in no answer.
//
// A part that is none of these is an element (Builder.Element): a law says what flows
// into its ports, what it stores, how its own unknowns move, and when it goes from one
// mode to another. A network with elements is M x' = F(t, x): Begin finds its state at
// t = 0, Operate a steady one, March answers against time, and Linearise returns the
// linear network about a state, of which all above is true again.
//
// Not modelled here: a capacity between two nodes, and delays.
package network
