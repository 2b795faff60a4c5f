// Enough channels whose sum of the last `length` baseline-subtracted samples reaches a value: after
// rising edge s, of sample s.
// A circular buffer of raw codes gives back the sample that leaves; a register keeps the sum.
`default_nettype none
module boxcar_sum_condition #(
    parameter CHANNELS     = 4,
    parameter DEPTH        = 256,                            // greatest length
    parameter ADDRESS_BITS = DEPTH < 3 ? 1 : $clog2(DEPTH)
) (
    input  wire                    clk,
    input  wire                    rst,
    input  wire [16*CHANNELS-1:0]  samples,
    input  wire [16*CHANNELS-1:0]  baseline,
    input  wire [64*CHANNELS-1:0]  sum,      // counts x samples, signed; equal is enough
    input  wire [CHANNELS-1:0]     mask,
    input  wire [4:0]              majority,
    input  wire [ADDRESS_BITS-1:0] length_less_one,
    output wire                    condition
);
  localparam SUM_BITS = 17 + ADDRESS_BITS + 1;
  localparam [ADDRESS_BITS-1:0] ONE = 1;

  reg [16*CHANNELS-1:0]  line[0:DEPTH-1];
  reg [ADDRESS_BITS-1:0] slot;
  reg                    full;   // the line holds a whole length
  reg                    begun;  // a sample has come: before, even a sum of 0 means nothing

  // Before the line is full the baseline leaves it, that is a height of nothing.
  wire [16*CHANNELS-1:0] leaving = full ? line[slot] : baseline;

  always @(posedge clk) begin
    if (rst) begin
      slot <= {ADDRESS_BITS{1'b0}};
      full <= 1'b0;
      begun <= 1'b0;
    end else begin
      begun <= 1'b1;
      line[slot] <= samples;
      if (slot == length_less_one) begin
        slot <= {ADDRESS_BITS{1'b0}};
        full <= 1'b1;
      end else begin
        slot <= slot + ONE;
      end
    end
  end

  wire [CHANNELS-1:0] large_enough;
  genvar c;
  generate
    for (c = 0; c < CHANNELS; c = c + 1) begin : channel
      localparam PAD = SUM_BITS - 16;
      wire signed [SUM_BITS-1:0] entered = $signed({{PAD{1'b0}}, samples[16*c+:16]})
                                           - $signed({{PAD{1'b0}}, baseline[16*c+:16]});
      wire signed [SUM_BITS-1:0] left = $signed({{PAD{1'b0}}, leaving[16*c+:16]})
                                        - $signed({{PAD{1'b0}}, baseline[16*c+:16]});
      reg  signed [SUM_BITS-1:0] running;
      wire signed [63:0] wide = $signed({{(64 - SUM_BITS) {running[SUM_BITS-1]}}, running});
      wire signed [63:0] needed = $signed(sum[64*c+:64]);
      assign large_enough[c] = wide >= needed;
      always @(posedge clk) running <= rst ? {SUM_BITS{1'b0}} : running + entered - left;
    end
  endgenerate

  majority_vote #(.CHANNELS(CHANNELS)) vote (
      .votes(large_enough & mask & {CHANNELS{begun}}), .majority(majority), .enough(condition));
endmodule
`default_nettype wire
