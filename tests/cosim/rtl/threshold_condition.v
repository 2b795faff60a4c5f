// Enough channels at or above their level in the same sample: after rising edge s, of sample s.
`default_nettype none
module threshold_condition #(
    parameter CHANNELS = 4
) (
    input  wire                   clk,
    input  wire                   rst,
    input  wire [16*CHANNELS-1:0] samples,
    input  wire [16*CHANNELS-1:0] baseline,
    input  wire [32*CHANNELS-1:0] level,
    input  wire [CHANNELS-1:0]    mask,
    input  wire [4:0]             majority,
    output wire                   condition
);
  wire [CHANNELS-1:0] over;
  reg  [CHANNELS-1:0] votes;

  over_level #(.CHANNELS(CHANNELS)) comparators (
      .samples(samples), .baseline(baseline), .level(level), .over(over));

  always @(posedge clk) votes <= rst ? {CHANNELS{1'b0}} : over & mask;

  majority_vote #(.CHANNELS(CHANNELS)) vote (.votes(votes), .majority(majority), .enough(condition));
endmodule
`default_nettype wire
