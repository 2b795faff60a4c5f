// Enough channels with enough samples at or above the level among the last `window`: after rising
// edge s, of sample s.
// A circular one-bit delay line per channel (one shared RAM) remembers which sample leaves the
// window; an up/down counter per channel follows what enters and what leaves.
`default_nettype none
module time_over_threshold_condition #(
    parameter CHANNELS   = 4,
    parameter DEPTH      = 256,                              // largest window
    parameter ADDRESS_BITS = DEPTH < 3 ? 1 : $clog2(DEPTH)
) (
    input  wire                   clk,
    input  wire                   rst,
    input  wire [16*CHANNELS-1:0] samples,
    input  wire [16*CHANNELS-1:0] baseline,
    input  wire [32*CHANNELS-1:0] level,
    input  wire [CHANNELS-1:0]    mask,
    input  wire [4:0]             majority,
    input  wire [ADDRESS_BITS-1:0] window_less_one,
    input  wire [ADDRESS_BITS:0]   min_over,
    output wire                    condition
);
  localparam [ADDRESS_BITS-1:0] ONE = 1;

  wire [CHANNELS-1:0] over;
  over_level #(.CHANNELS(CHANNELS)) comparators (
      .samples(samples), .baseline(baseline), .level(level), .over(over));

  reg [CHANNELS-1:0]     line[0:DEPTH-1];
  reg [ADDRESS_BITS-1:0] slot;
  reg                    full;  // the line holds a whole window; until then nothing leaves it

  wire [CHANNELS-1:0] leaving = full ? line[slot] : {CHANNELS{1'b0}};

  always @(posedge clk) begin
    if (rst) begin
      slot <= {ADDRESS_BITS{1'b0}};
      full <= 1'b0;
    end else begin
      line[slot] <= over;
      if (slot == window_less_one) begin
        slot <= {ADDRESS_BITS{1'b0}};
        full <= 1'b1;
      end else begin
        slot <= slot + ONE;
      end
    end
  end

  wire [CHANNELS-1:0] long_enough;
  genvar c;
  generate
    for (c = 0; c < CHANNELS; c = c + 1) begin : channel
      reg [ADDRESS_BITS:0] count;
      assign long_enough[c] = count >= min_over;
      always @(posedge clk) begin
        if (rst) count <= {(ADDRESS_BITS + 1) {1'b0}};
        else count <= count + {{ADDRESS_BITS{1'b0}}, over[c]} - {{ADDRESS_BITS{1'b0}}, leaving[c]};
      end
    end
  endgenerate

  majority_vote #(.CHANNELS(CHANNELS)) vote (
      .votes(long_enough & mask), .majority(majority), .enough(condition));
endmodule
`default_nettype wire
