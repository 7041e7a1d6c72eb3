#include "textflag.h"

// The AVX kernels of kernel_generic.go, four columns at a time. Products are
// rounded before they are added (no fused multiply-add), and sums run in the
// order of the plain versions: the results are the same, bit for bit.

// func dotRowsAVX(a *float64, stride, rows, cols int, u, out *float64)
TEXT ·dotRowsAVX(SB), NOSPLIT, $0-48
	MOVQ a+0(FP), SI
	MOVQ stride+8(FP), DX
	MOVQ rows+16(FP), CX
	MOVQ cols+24(FP), R8
	MOVQ u+32(FP), R9
	MOVQ out+40(FP), DI
	SHLQ $3, DX                // bytes between rows
	SHLQ $3, R8                // bytes in a row
	LEAQ (DX)(DX*2), R10       // three rows

dotFour:
	CMPQ CX, $4
	JLT  dotOne
	VXORPD Y0, Y0, Y0
	VXORPD Y1, Y1, Y1
	VXORPD Y2, Y2, Y2
	VXORPD Y3, Y3, Y3
	MOVQ SI, AX
	XORQ BX, BX

dotFourLoop:
	VMOVUPD (R9)(BX*1), Y4
	VMULPD  (AX), Y4, Y5
	VMULPD  (AX)(DX*1), Y4, Y6
	VMULPD  (AX)(DX*2), Y4, Y7
	VMULPD  (AX)(R10*1), Y4, Y8
	VADDPD  Y5, Y0, Y0
	VADDPD  Y6, Y1, Y1
	VADDPD  Y7, Y2, Y2
	VADDPD  Y8, Y3, Y3
	ADDQ $32, AX
	ADDQ $32, BX
	CMPQ BX, R8
	JLT  dotFourLoop

	VEXTRACTF128 $1, Y0, X5
	VEXTRACTF128 $1, Y1, X6
	VEXTRACTF128 $1, Y2, X7
	VEXTRACTF128 $1, Y3, X8
	VADDPD X5, X0, X0          // s0+s2, s1+s3
	VADDPD X6, X1, X1
	VADDPD X7, X2, X2
	VADDPD X8, X3, X3
	VHADDPD X1, X0, X0
	VHADDPD X3, X2, X2
	VMOVUPD X0, (DI)
	VMOVUPD X2, 16(DI)
	ADDQ $32, DI
	LEAQ (SI)(DX*4), SI
	SUBQ $4, CX
	JMP  dotFour

dotOne:
	TESTQ CX, CX
	JLE  dotDone
	VXORPD Y0, Y0, Y0
	XORQ BX, BX

dotOneLoop:
	VMOVUPD (R9)(BX*1), Y4
	VMULPD  (SI)(BX*1), Y4, Y5
	VADDPD  Y5, Y0, Y0
	ADDQ $32, BX
	CMPQ BX, R8
	JLT  dotOneLoop

	VEXTRACTF128 $1, Y0, X5
	VADDPD  X5, X0, X0
	VHADDPD X0, X0, X0
	VMOVSD  X0, (DI)
	ADDQ $8, DI
	ADDQ DX, SI
	DECQ CX
	JMP  dotOne

dotDone:
	VZEROUPPER
	RET

// func updateRowsAVX(a *float64, stride, rows, cols int, v, w, t, u, x, sum *float64)
TEXT ·updateRowsAVX(SB), NOSPLIT, $0-80
	MOVQ a+0(FP), SI
	MOVQ stride+8(FP), DX
	MOVQ rows+16(FP), CX
	MOVQ cols+24(FP), R8
	MOVQ v+32(FP), R9
	MOVQ w+40(FP), R10
	MOVQ t+48(FP), R11
	MOVQ u+56(FP), R12
	MOVQ x+64(FP), R13
	MOVQ sum+72(FP), DI
	SHLQ $3, DX
	SHLQ $3, R8

updateTwo:
	CMPQ CX, $2
	JLT  updateOne
	VBROADCASTSD (R9), Y0      // v
	VBROADCASTSD 8(R9), Y1
	VBROADCASTSD (R11), Y2     // t
	VBROADCASTSD 8(R11), Y3
	VBROADCASTSD (R13), Y4     // x
	VBROADCASTSD 8(R13), Y5
	LEAQ (SI)(DX*1), AX
	XORQ BX, BX

updateTwoLoop:
	VMOVUPD (R10)(BX*1), Y6    // w
	VMOVUPD (R12)(BX*1), Y7    // u
	VMULPD  Y0, Y6, Y8
	VMULPD  Y2, Y7, Y9
	VMULPD  Y1, Y6, Y10
	VMULPD  Y3, Y7, Y11
	VADDPD  Y9, Y8, Y8
	VADDPD  Y11, Y10, Y10
	VMOVUPD (SI)(BX*1), Y12
	VMOVUPD (AX)(BX*1), Y13
	VSUBPD  Y8, Y12, Y12
	VSUBPD  Y10, Y13, Y13
	VMOVUPD Y12, (SI)(BX*1)
	VMOVUPD Y13, (AX)(BX*1)
	VMULPD  Y4, Y12, Y12
	VMULPD  Y5, Y13, Y13
	VADDPD  Y13, Y12, Y12
	VADDPD  (DI)(BX*1), Y12, Y12
	VMOVUPD Y12, (DI)(BX*1)
	ADDQ $32, BX
	CMPQ BX, R8
	JLT  updateTwoLoop

	ADDQ $16, R9
	ADDQ $16, R11
	ADDQ $16, R13
	LEAQ (SI)(DX*2), SI
	SUBQ $2, CX
	JMP  updateTwo

updateOne:
	TESTQ CX, CX
	JLE  updateDone
	VBROADCASTSD (R9), Y0
	VBROADCASTSD (R11), Y2
	VBROADCASTSD (R13), Y4
	XORQ BX, BX

updateOneLoop:
	VMULPD  (R10)(BX*1), Y0, Y8
	VMULPD  (R12)(BX*1), Y2, Y9
	VADDPD  Y9, Y8, Y8
	VMOVUPD (SI)(BX*1), Y12
	VSUBPD  Y8, Y12, Y12
	VMOVUPD Y12, (SI)(BX*1)
	VMULPD  Y4, Y12, Y12
	VADDPD  (DI)(BX*1), Y12, Y12
	VMOVUPD Y12, (DI)(BX*1)
	ADDQ $32, BX
	CMPQ BX, R8
	JLT  updateOneLoop

updateDone:
	VZEROUPPER
	RET

// func addRowAVX(f float64, x, y *float64, n int)
TEXT ·addRowAVX(SB), NOSPLIT, $0-32
	VBROADCASTSD f+0(FP), Y0
	MOVQ x+8(FP), SI
	MOVQ y+16(FP), DI
	MOVQ n+24(FP), CX
	SHLQ $3, CX
	XORQ BX, BX

addLoop:
	VMULPD  (SI)(BX*1), Y0, Y1
	VADDPD  (DI)(BX*1), Y1, Y1
	VMOVUPD Y1, (DI)(BX*1)
	ADDQ $32, BX
	CMPQ BX, CX
	JLT  addLoop
	VZEROUPPER
	RET

// func turnRowsAVX(sin, half float64, x, y *float64, n int)
TEXT ·turnRowsAVX(SB), NOSPLIT, $0-40
	VBROADCASTSD sin+0(FP), Y0
	VBROADCASTSD half+8(FP), Y1
	MOVQ x+16(FP), SI
	MOVQ y+24(FP), DI
	MOVQ n+32(FP), CX
	SHLQ $3, CX
	XORQ BX, BX

turnLoop:
	VMOVUPD (SI)(BX*1), Y2     // p
	VMOVUPD (DI)(BX*1), Y3     // q
	VMULPD  Y1, Y2, Y4
	VMULPD  Y1, Y3, Y5
	VADDPD  Y4, Y3, Y4         // q + half p
	VSUBPD  Y5, Y2, Y5         // p - half q
	VMULPD  Y0, Y4, Y4
	VMULPD  Y0, Y5, Y5
	VSUBPD  Y4, Y2, Y2
	VADDPD  Y5, Y3, Y3
	VMOVUPD Y2, (SI)(BX*1)
	VMOVUPD Y3, (DI)(BX*1)
	ADDQ $32, BX
	CMPQ BX, CX
	JLT  turnLoop
	VZEROUPPER
	RET
