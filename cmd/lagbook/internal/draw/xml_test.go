package draw

import (
	"bytes"
	"encoding/xml"
	"errors"
	"io"
)

// wellFormed reads a picture to its end.
func wellFormed(b []byte) error {
	d := xml.NewDecoder(bytes.NewReader(b))
	for {
		switch _, err := d.Token(); {
		case errors.Is(err, io.EOF):
			return nil
		case err != nil:
			return err
		}
	}
}
