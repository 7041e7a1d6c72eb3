package laplace

// CommonPeriod returns the period in s with which all waves together repeat in the long
// run, 0 where none does, and the time in s from which on each is its own long run, but
// for what decays. The error is *Unsettled for a wave that neither repeats nor settles
// and *NotCommensurate for periods without a whole-number ratio.
func CommonPeriod(u []Waveform) (period, from float64, err error) {
	var beats []beat
	for i := range u {
		u[i].check()
		s, err := u[i].inTheLongRun(i)
		if err != nil {
			return 0, 0, err
		}
		from = max(from, s.from)
		beats = append(beats, s.beats(i)...)
	}
	period, err = common(beats)
	return period, from, err
}
