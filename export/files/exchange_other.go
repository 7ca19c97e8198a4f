//go:build !linux && !darwin

package files

func exchange(string, string) error { return errNoExchange }
