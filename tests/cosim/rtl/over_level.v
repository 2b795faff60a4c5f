// Comparator bank: which channels are at or above their level, in height over the baseline.
`default_nettype none
module over_level #(
    parameter CHANNELS = 4
) (
    input  wire [16*CHANNELS-1:0] samples,   // raw codes, unsigned, channel 0 lowest
    input  wire [16*CHANNELS-1:0] baseline,  // counts, unsigned
    input  wire [32*CHANNELS-1:0] level,     // counts above baseline, signed; equal is over
    output wire [CHANNELS-1:0]    over
);
  genvar c;
  generate
    for (c = 0; c < CHANNELS; c = c + 1) begin : channel
      // The level as a code: baseline and level change rarely, so one comparator does it.
      wire signed [32:0] base   = $signed({17'd0, baseline[16*c+:16]});
      wire signed [32:0] needed = base + $signed({level[32*c+31], level[32*c+:32]});
      wire signed [32:0] code   = $signed({17'd0, samples[16*c+:16]});
      assign over[c] = code >= needed;
    end
  endgenerate
endmodule
`default_nettype wire
