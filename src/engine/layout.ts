// Owns the layout of a run's memory image: where each word of the header, the row program and its records stands.
// Read by the AssemblyScript kernel and by its TypeScript twin alike, so only untyped whole-number constants may stand here.

// Header: 32-bit words at the start of the image. "Offset" is in bytes from the start of the image.
export const H_STRIDE = 0; // floats from one row to the next
export const H_ROWS = 1; // rows passed in a step; the first is row 1
export const H_U = 2; // offset of u
export const H_VX = 3; // offset of vx, vx[j] being the link below u[j]
export const H_VY = 4; // offset of vy, vy[i] being the link to the left of u[i]
export const H_ROW_TABLE = 5; // offset of the row table: one word a row, the offset of its program
export const H_CHANNELS = 6; // recorded channels a step
export const H_RECORD = 7; // offset of the record: float32 [step of the slice][channel]
export const H_SOURCES = 8; // source values a step
export const H_SOURCE_TABLE = 9; // offset of the source table: float64 [step of the slice][source]
export const H_LINES = 10; // incident lines
export const H_LINE_TABLE = 11; // offset of the first line record
export const H_WRAP_Y = 12; // 1 when bottom and top edges repeat
export const H_SLICE = 13; // most steps in one call
export const H_BLOCK = 14; // steps that follow each other down the rows while these are in cache
export const H_BUFFERS = 15; // sets of levels of the incident lines: 1, or one more than the threads that work on blocks at once
export const HEADER_WORDS = 16;

// A row of a picture, in bytes from the start of the memory: float32.
export const PICTURE_ROW = 4096;
export const PICTURE_MOST = 7000; // samples in a row

// Words by which threads keep in step, in bytes from the start of the memory (below the image, so that clearing it leaves
// them), each in a cache line of its own.
export const SYNC_READY = 32768; // int32: helpers that serve
export const SYNC_GO = 32832; // int32: slice number times 16, plus the threads that work on it; changing it starts them
export const SYNC_STOP = 32896; // int32: 1 sends the helpers home at the next start
export const SYNC_STEPS = 32960; // int32: steps of the slice
export const SYNC_FIRST_BLOCK = 33024; // int64: number of the slice's first block, counted since the memory was made
export const SYNC_ENDED = 33088; // int32: helpers that have ended the slice
export const SYNC_LINES = 33152; // int64: blocks whose incident lines are stepped
export const SYNC_PROGRESS = 33216; // int64 a thread, 64 bytes apart: block number times (rows + 2), plus rows it is done with
export const MOST_THREADS = 8;

// Columns before the first unknown: u[-1] of the first column falls into zeros that nobody writes.
export const PAD_COLUMNS = 4;

// Row program: the number of spans, the span records, the wrap record, the number of taps, the tap records.
export const SPAN_KIND = 0;
export const SPAN_COLUMN = 1; // first column, a multiple of 4
export const SPAN_COUNT = 2; // columns, a multiple of 4
export const SPAN_COEFFICIENTS = 3; // offset of the arrays the kind calls for, in the order named there, SPAN_COUNT floats each
export const SPAN_BU = 4; // float32 scalars where the kind has no array
export const SPAN_BVX = 5;
export const SPAN_BVY = 6;
export const SPAN_ABSORB_X = 7; // offset of b, c for u and b, c for vy: arrays of SPAN_COUNT floats; 0 when not in the strip
export const SPAN_PSI_X = 8; // offset of psi of u, then psi of vy: SPAN_COUNT floats each
export const SPAN_PSI_Y = 9; // offset of psi of u, then psi of vx: SPAN_COUNT floats each; 0 when not in the strip
export const SPAN_Y_BU = 10; // float32: b, c of this row for u, then of the links below it for vx
export const SPAN_Y_CU = 11;
export const SPAN_Y_BV = 12;
export const SPAN_Y_CV = 13;
export const SPAN_POINTS = 14; // offset of the point records: those on u first
export const SPAN_U_POINTS = 15;
export const SPAN_V_POINTS = 16;
export const SPAN_WORDS = 18;

// Kinds of span: which coefficients are given a cell. Loads are scarce, so what is even along a span is a scalar.
export const PLAIN = 0; // none: scalars, no loss
export const NODES = 1; // bu
export const LINKS = 2; // bvx, bvy
export const LOSSLESS = 3; // bu, bvx, bvy
export const LOSSY = 4; // bu, bvx, bvy, au, avx, avy
export const KIND_MASK = 7;
// Flag on LOSSLESS or LOSSY: worked spans do u and v in turn, with the terms of absorbers and drives between.
export const WORKED = 8;

// Wrap record: repeating left and right edges share one link, updated after the row.
export const WRAP_FIRST = 0; // column of the first u, or 0 when the row does not wrap
export const WRAP_LAST = 1; // column of the last u
export const WRAP_A = 2; // float32
export const WRAP_B = 3; // float32
export const WRAP_WORDS = 4;

// Point record: field[column] += weight * source, on fields of the row.
export const POINT_FIELD = 0; // 0 u, 1 vx, 2 vy
export const POINT_COLUMN = 1;
export const POINT_SOURCE = 2; // offset of a float64: in the source table at step 0 of the slice, or in an incident line at step 0 of the block
export const POINT_STEP = 3; // bytes to the value of the next step
export const POINT_FROM_TABLE = 4; // 1: source table, 0: incident line
export const POINT_WEIGHT = 6; // float64, two words
export const POINT_WORDS = 8;

// Tap record: record[channel] += weight * field[column].
export const TAP_FIELD = 0;
export const TAP_COLUMN = 1;
export const TAP_CHANNEL = 2;
export const TAP_WEIGHT = 3; // float32
export const TAP_WORDS = 4;

// Incident line: a plane wave on the grid, u(i, j) = U[mx i + my j], stepped with the sheet's own coefficients. Its levels
// of a block stand side by side: level 0 is the state at the block's start, level n + 1 the state after step n.
export const LINE_LENGTH = 0;
export const LINE_MX = 1;
export const LINE_MY = 2;
export const LINE_FED = 3; // the first entries of U are given, not computed
export const LINE_U = 4; // offsets of U, Vx, Vy at level 0: float64 arrays
export const LINE_VX = 5;
export const LINE_VY = 6;
export const LINE_LEVEL = 7; // bytes from one level to the next; a buffer holds a block's, level 0 included
export const LINE_A = 8; // a and b per half entry (u at 2r, vx at 2r - my, vy at 2r - mx): the matched absorbing tail
export const LINE_B = 9;
export const LINE_BU = 10; // float64, two words each
export const LINE_BVX = 12;
export const LINE_BVY = 14;
export const LINE_FEED = 16; // offset of the feed table: float64 [step of the slice][LINE_FED]
export const LINE_WORDS = 20;
