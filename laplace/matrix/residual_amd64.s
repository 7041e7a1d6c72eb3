#include "textflag.h"

// TWICE adds (Y6 + Y7)·X to H + L, as sumTwiceGo does.
#define TWICE(X, H, L) \
	VMULPD Y6, X, Y8; \
	VMOVAPD X, Y9; \
	VFMSUB213PD Y8, Y6, Y9; \
	VMULPD Y7, X, X; \
	VADDPD X, Y9, Y9; \
	VADDPD Y8, H, Y10; \
	VSUBPD H, Y10, Y11; \
	VSUBPD Y11, Y10, Y12; \
	VSUBPD Y12, H, Y12; \
	VSUBPD Y11, Y8, Y8; \
	VADDPD Y8, Y12, Y12; \
	VADDPD Y9, Y12, Y12; \
	VADDPD Y12, L, L; \
	VMOVAPD Y10, H

// func sumTwiceFMA(w, m int, x *float64, col *int, n int, hi, lo, high, low *float64)
// Eight columns at a time, w a multiple of 8; the same bits as sumTwiceGo.
TEXT ·sumTwiceFMA(SB), NOSPLIT, $0-72
	MOVQ w+0(FP), R8
	MOVQ m+8(FP), DX
	MOVQ x+16(FP), SI
	MOVQ col+24(FP), R9
	MOVQ n+32(FP), R10
	MOVQ hi+40(FP), R11
	MOVQ lo+48(FP), R12
	MOVQ high+56(FP), DI
	MOVQ low+64(FP), BX
	SHLQ $3, DX

twiceStrip:
	VMOVUPD (DI), Y0
	VMOVUPD 32(DI), Y1
	VMOVUPD (BX), Y2
	VMOVUPD 32(BX), Y3
	XORQ CX, CX

twiceLoop:
	MOVQ (R9)(CX*8), AX
	IMULQ DX, AX
	VMOVUPD (SI)(AX*1), Y4
	VMOVUPD 32(SI)(AX*1), Y5
	VBROADCASTSD (R11)(CX*8), Y6
	VBROADCASTSD (R12)(CX*8), Y7
	TWICE(Y4, Y0, Y2)
	TWICE(Y5, Y1, Y3)
	INCQ CX
	CMPQ CX, R10
	JLT  twiceLoop

	VMOVUPD Y0, (DI)
	VMOVUPD Y1, 32(DI)
	VMOVUPD Y2, (BX)
	VMOVUPD Y3, 32(BX)
	ADDQ $64, SI
	ADDQ $64, DI
	ADDQ $64, BX
	SUBQ $8, R8
	JGT  twiceStrip
	VZEROUPPER
	RET
