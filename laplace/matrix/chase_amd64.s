#include "textflag.h"

// The AVX kernels of chase_generic.go. Products are rounded before they are
// added, and sums run in the order of the plain versions.

// TURN applies the reflector at off(R11) to three vectors.
#define TURN(off, A0, A1, A2) \
	VBROADCASTSD off+0(R11), Y15; \
	VMULPD Y15, A0, Y12; \
	VBROADCASTSD off+8(R11), Y15; \
	VMULPD Y15, A1, Y14; \
	VADDPD Y14, Y12, Y12; \
	VBROADCASTSD off+16(R11), Y15; \
	VMULPD Y15, A2, Y14; \
	VADDPD Y14, Y12, Y12; \
	VSUBPD Y12, A0, A0; \
	VBROADCASTSD off+24(R11), Y15; \
	VMULPD Y15, Y12, Y14; \
	VSUBPD Y14, A1, A1; \
	VBROADCASTSD off+32(R11), Y15; \
	VMULPD Y15, Y12, Y14; \
	VSUBPD Y14, A2, A2

// TURN2 applies it to two sets of three vectors.
#define TURN2(off, A0, A1, A2, B0, B1, B2) \
	VBROADCASTSD off+0(R11), Y15; \
	VMULPD Y15, A0, Y12; \
	VMULPD Y15, B0, Y13; \
	VBROADCASTSD off+8(R11), Y15; \
	VMULPD Y15, A1, Y14; \
	VADDPD Y14, Y12, Y12; \
	VMULPD Y15, B1, Y14; \
	VADDPD Y14, Y13, Y13; \
	VBROADCASTSD off+16(R11), Y15; \
	VMULPD Y15, A2, Y14; \
	VADDPD Y14, Y12, Y12; \
	VMULPD Y15, B2, Y14; \
	VADDPD Y14, Y13, Y13; \
	VSUBPD Y12, A0, A0; \
	VSUBPD Y13, B0, B0; \
	VBROADCASTSD off+24(R11), Y15; \
	VMULPD Y15, Y12, Y14; \
	VSUBPD Y14, A1, A1; \
	VMULPD Y15, Y13, Y14; \
	VSUBPD Y14, B1, B1; \
	VBROADCASTSD off+32(R11), Y15; \
	VMULPD Y15, Y12, Y14; \
	VSUBPD Y14, A2, A2; \
	VMULPD Y15, Y13, Y14; \
	VSUBPD Y14, B2, B2

// func chaseRowsAVX(a *float64, stride, k, cols int, c *float64)
TEXT ·chaseRowsAVX(SB), NOSPLIT, $0-40
	MOVQ a+0(FP), SI
	MOVQ stride+8(FP), DX
	MOVQ cols+24(FP), R8
	SHLQ $3, DX

rowsEight:
	CMPQ R8, $8
	JLT  rowsFour
	MOVQ SI, AX
	MOVQ k+16(FP), CX
	MOVQ c+32(FP), R11
	VMOVUPD (AX), Y0
	VMOVUPD 32(AX), Y3
	VMOVUPD (AX)(DX*1), Y1
	VMOVUPD 32(AX)(DX*1), Y4

rowsEightLoop:
	VMOVUPD (AX)(DX*2), Y2
	VMOVUPD 32(AX)(DX*2), Y5
	TURN2(0, Y0, Y1, Y2, Y3, Y4, Y5)
	VMOVUPD Y0, (AX)
	VMOVUPD Y3, 32(AX)
	VMOVAPD Y1, Y0
	VMOVAPD Y4, Y3
	VMOVAPD Y2, Y1
	VMOVAPD Y5, Y4
	ADDQ DX, AX
	ADDQ $40, R11
	DECQ CX
	JNZ  rowsEightLoop

	VMOVUPD Y0, (AX)
	VMOVUPD Y3, 32(AX)
	VMOVUPD Y1, (AX)(DX*1)
	VMOVUPD Y4, 32(AX)(DX*1)
	ADDQ $64, SI
	SUBQ $8, R8
	JMP  rowsEight

rowsFour:
	TESTQ R8, R8
	JLE  rowsDone
	MOVQ SI, AX
	MOVQ k+16(FP), CX
	MOVQ c+32(FP), R11
	VMOVUPD (AX), Y0
	VMOVUPD (AX)(DX*1), Y1

rowsFourLoop:
	VMOVUPD (AX)(DX*2), Y2
	TURN(0, Y0, Y1, Y2)
	VMOVUPD Y0, (AX)
	VMOVAPD Y1, Y0
	VMOVAPD Y2, Y1
	ADDQ DX, AX
	ADDQ $40, R11
	DECQ CX
	JNZ  rowsFourLoop

	VMOVUPD Y0, (AX)
	VMOVUPD Y1, (AX)(DX*1)

rowsDone:
	VZEROUPPER
	RET

// TAKE loads two columns at off of the four rows from P into two vectors.
#define TAKE(off, P, A0, A1) \
	VMOVUPD off(P), X12; \
	VINSERTF128 $1, off(P)(DX*2), Y12, Y12; \
	VMOVUPD off(P)(DX*1), X13; \
	VINSERTF128 $1, off(P)(R10*1), Y13, Y13; \
	VUNPCKLPD Y13, Y12, A0; \
	VUNPCKHPD Y13, Y12, A1

// GIVE stores them.
#define GIVE(off, P, A0, A1) \
	VUNPCKLPD A1, A0, Y12; \
	VUNPCKHPD A1, A0, Y13; \
	VMOVUPD X12, off(P); \
	VMOVUPD X13, off(P)(DX*1); \
	VEXTRACTF128 $1, Y12, off(P)(DX*2); \
	VEXTRACTF128 $1, Y13, off(P)(R10*1)

// func chaseColumnsAVX(a *float64, stride, k, rows int, c *float64)
TEXT ·chaseColumnsAVX(SB), NOSPLIT, $0-40
	MOVQ a+0(FP), SI
	MOVQ stride+8(FP), DX
	MOVQ rows+24(FP), R8
	SHLQ $3, DX
	LEAQ (DX)(DX*2), R10

columnsEight:
	CMPQ R8, $8
	JLT  columnsFour
	MOVQ SI, AX
	LEAQ (SI)(DX*4), BX
	MOVQ k+16(FP), CX
	MOVQ c+32(FP), R11
	TAKE(0, AX, Y0, Y1)
	TAKE(0, BX, Y6, Y7)

columnsEightLoop:
	TAKE(16, AX, Y2, Y3)
	TAKE(16, BX, Y8, Y9)
	TAKE(32, AX, Y4, Y5)
	TAKE(32, BX, Y10, Y11)
	TURN2(0, Y0, Y1, Y2, Y6, Y7, Y8)
	TURN2(40, Y1, Y2, Y3, Y7, Y8, Y9)
	GIVE(0, AX, Y0, Y1)
	GIVE(0, BX, Y6, Y7)
	TURN2(80, Y2, Y3, Y4, Y8, Y9, Y10)
	TURN2(120, Y3, Y4, Y5, Y9, Y10, Y11)
	GIVE(16, AX, Y2, Y3)
	GIVE(16, BX, Y8, Y9)
	VMOVAPD Y4, Y0
	VMOVAPD Y5, Y1
	VMOVAPD Y10, Y6
	VMOVAPD Y11, Y7
	ADDQ $32, AX
	ADDQ $32, BX
	ADDQ $160, R11
	SUBQ $4, CX
	JNZ  columnsEightLoop

	GIVE(0, AX, Y0, Y1)
	GIVE(0, BX, Y6, Y7)
	LEAQ (SI)(DX*8), SI
	SUBQ $8, R8
	JMP  columnsEight

columnsFour:
	TESTQ R8, R8
	JLE  columnsDone
	MOVQ SI, AX
	MOVQ k+16(FP), CX
	MOVQ c+32(FP), R11
	TAKE(0, AX, Y0, Y1)

columnsFourLoop:
	TAKE(16, AX, Y2, Y3)
	TAKE(32, AX, Y4, Y5)
	TURN(0, Y0, Y1, Y2)
	TURN(40, Y1, Y2, Y3)
	GIVE(0, AX, Y0, Y1)
	TURN(80, Y2, Y3, Y4)
	TURN(120, Y3, Y4, Y5)
	GIVE(16, AX, Y2, Y3)
	VMOVAPD Y4, Y0
	VMOVAPD Y5, Y1
	ADDQ $32, AX
	ADDQ $160, R11
	SUBQ $4, CX
	JNZ  columnsFourLoop

	GIVE(0, AX, Y0, Y1)

columnsDone:
	VZEROUPPER
	RET

// func sumRowsAVX(a *float64, stride, rows, cols int, f, y *float64)
TEXT ·sumRowsAVX(SB), NOSPLIT, $0-48
	MOVQ a+0(FP), SI
	MOVQ stride+8(FP), DX
	MOVQ cols+24(FP), R8
	MOVQ y+40(FP), DI
	SHLQ $3, DX

sumSixteen:
	CMPQ R8, $16
	JLT  sumFour
	MOVQ SI, AX
	MOVQ rows+16(FP), CX
	MOVQ f+32(FP), R11
	VMOVUPD (DI), Y0
	VMOVUPD 32(DI), Y1
	VMOVUPD 64(DI), Y2
	VMOVUPD 96(DI), Y3

sumSixteenLoop:
	VBROADCASTSD (R11), Y8
	VMULPD (AX), Y8, Y4
	VMULPD 32(AX), Y8, Y5
	VMULPD 64(AX), Y8, Y6
	VMULPD 96(AX), Y8, Y7
	VADDPD Y4, Y0, Y0
	VADDPD Y5, Y1, Y1
	VADDPD Y6, Y2, Y2
	VADDPD Y7, Y3, Y3
	ADDQ DX, AX
	ADDQ $8, R11
	DECQ CX
	JNZ  sumSixteenLoop

	VMOVUPD Y0, (DI)
	VMOVUPD Y1, 32(DI)
	VMOVUPD Y2, 64(DI)
	VMOVUPD Y3, 96(DI)
	ADDQ $128, SI
	ADDQ $128, DI
	SUBQ $16, R8
	JMP  sumSixteen

sumFour:
	TESTQ R8, R8
	JLE  sumDone
	MOVQ SI, AX
	MOVQ rows+16(FP), CX
	MOVQ f+32(FP), R11
	VMOVUPD (DI), Y0

sumFourLoop:
	VBROADCASTSD (R11), Y8
	VMULPD (AX), Y8, Y4
	VADDPD Y4, Y0, Y0
	ADDQ DX, AX
	ADDQ $8, R11
	DECQ CX
	JNZ  sumFourLoop

	VMOVUPD Y0, (DI)
	ADDQ $32, SI
	ADDQ $32, DI
	SUBQ $4, R8
	JMP  sumFour

sumDone:
	VZEROUPPER
	RET
