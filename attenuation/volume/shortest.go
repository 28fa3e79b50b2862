package volume

import (
	"encoding/binary"
	"math"
	"math/bits"
)

// placesOf[e-minExp] are the decimal places of a unit that is at most 2^e and more
// than a tenth of it.
var placesOf = [...]uint8{16, 16, 16, 16, 15, 15, 15, 14, 14, 14, 13}

// tens[places] units make one.
var tens = [...]uint64{1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16}

const (
	mantissaBits = 52
	minExp       = -53                        // of the last bit, in numbers from 0.5 on
	maxExp       = minExp + len(placesOf) - 1 // and below 2^10
	shortRoom    = 24                         // bytes that appendShort may write over
)

// appendShort appends x in the fewest digits that read back as x, as
// strconv.AppendFloat(dst, x, 'f', -1, 64) does, several times faster. It takes
// numbers from 0.5 to 1024 but for those that need more care: whole powers of two,
// whose neighbours lie unevenly, and those halfway between two decimals. For all
// others it is not ok and dst is as it was.
//
// x = m·2^e is scaled to units of 10^-places, the product of m and a power of ten in
// 128 bits without rounding. Decimals within half of 2^e of x read back as x. As the
// unit is at most 2^e, the whole number of units nearest to x does; as it is more
// than a tenth of 2^e, at most one multiple of ten units does, and it is shorter.
// (Giulietti 2020, The Schubfach way to render doubles.)
func appendShort(dst []byte, x float64) (_ []byte, ok bool) {
	b := math.Float64bits(x)
	e := int(b>>mantissaBits) - 1075
	frac := b & (1<<mantissaBits - 1)
	if e < minExp || e > maxExp || frac == 0 { // a negative number has a large e
		return dst, false
	}
	m := frac | 1<<mantissaBits
	places := placesOf[e-minExp]
	unit := tens[places]
	shift := uint(1-e) & 63 // is below 64: the mask only tells the compiler
	hi, lo := bits.Mul64(2*m, unit)
	units := hi<<((64-shift)&63) | lo>>shift
	over := lo & (1<<shift - 1) // x is units·2^shift + over
	// Which of the branches is taken is hard to predict, so that there are few.
	round := (units + 5) / 10 * 10
	off := int64(round-units)<<shift - int64(over)
	// Half of 2^e is unit. A decimal at the very end of the interval rounds to even.
	short := max(off, -off) <= int64(unit-m&1)
	if short {
		units = round
	} else {
		middle := uint64(1) << ((shift - 1) & 63)
		if over == middle {
			return dst, false
		}
		units += over >> ((shift - 1) & 63)
	}
	whole := m >> ((shift - 1) & 63)
	part := units - whole*unit
	if part >= unit { // rounded up to the next whole number
		whole, part = whole+1, part-unit
	}
	dst = appendPlaces(dst, whole, part*tens[16-places], int(places))
	if short {
		n := len(dst)
		for dst[n-1] == '0' {
			n--
		}
		if dst[n-1] == '.' {
			n--
		}
		dst = dst[:n]
	}
	return dst, true
}

// appendPlaces appends whole, below 10 000, and so many decimal places of part
// units of 10^-16.
func appendPlaces(dst []byte, whole, part uint64, places int) []byte {
	at := len(dst)
	if cap(dst)-at < shortRoom {
		dst = append(dst, make([]byte, shortRoom)...)
	}
	dst = dst[:at+shortRoom]
	if whole >= 100 {
		if whole >= 1000 {
			dst[at] = byte('0' + whole/1000)
			at++
		}
		dst[at], dst[at+1], dst[at+2] = byte('0'+whole/100%10), byte('0'+whole/10%10), byte('0'+whole%10)
		at += 3
	} else {
		// One digit or two without a branch: a first zero is shifted out.
		one := (whole - 10) >> 63 // 1 below ten
		two := '0' + whole/10 | ('0'+whole%10)<<8
		binary.LittleEndian.PutUint16(dst[at:], uint16(two>>(8*one)))
		at += 2 - int(one)
	}
	dst[at] = '.'
	at++
	// All sixteen places are written, and those that are too many cut off again.
	b := dst[at : at+16 : at+16]
	binary.LittleEndian.PutUint64(b, eightDigits(part/1e8))
	binary.LittleEndian.PutUint64(b[8:], eightDigits(part%1e8))
	return dst[:at+places]
}

// eightDigits returns the eight decimal digits of n < 10^8 as text, the first in the
// lowest byte. They are found all at once, in lanes of 32, 16 and 8 bits; the
// multiplications divide by 100 and by 10, exactly for what the lanes hold.
func eightDigits(n uint64) uint64 {
	n = n/10000 | n%10000<<32
	hundreds := n * 10486 >> 20 & 0x0000007f_0000007f
	n = hundreds | (n-100*hundreds)<<16
	tens := n * 103 >> 10 & 0x000f000f_000f000f
	n = tens | (n-10*tens)<<8
	return n | 0x30303030_30303030
}
