// Time-over-threshold trigger with plain ports: fire rises after rising edge s for a firing at
// sample s.
`default_nettype none
module time_over_threshold #(
    parameter                     CHANNELS    = 4,
    parameter [16*CHANNELS-1:0]   BASELINE    = {CHANNELS{16'd200}},
    parameter [32*CHANNELS-1:0]   LEVEL       = {CHANNELS{32'd60}},
    parameter                     WINDOW      = 150,         // samples
    parameter                     MIN_OVER    = 21,
    parameter [CHANNELS-1:0]      MASK        = {CHANNELS{1'b1}},
    parameter [4:0]               MAJORITY    = 5'd2,
    parameter [31:0]              HOLD_OFF    = 32'd0,
    parameter                     REARM_LEVEL = 1'b0,
    parameter [31:0]              PRESCALE    = 32'd1
) (
    input  wire                   clk,
    input  wire                   rst,
    input  wire [16*CHANNELS-1:0] samples,
    output wire                   condition,
    output wire                   fire,
    output wire                   held_off,
    output wire                   prescaled
);
  localparam ADDRESS_BITS = WINDOW < 3 ? 1 : $clog2(WINDOW);
  localparam [31:0] LAST_SLOT = WINDOW - 1;
  localparam [31:0] NEEDED = MIN_OVER;

  time_over_threshold_condition #(.CHANNELS(CHANNELS), .DEPTH(WINDOW)) rule (
      .clk(clk), .rst(rst), .samples(samples), .baseline(BASELINE), .level(LEVEL), .mask(MASK),
      .majority(MAJORITY), .window_less_one(LAST_SLOT[ADDRESS_BITS-1:0]),
      .min_over(NEEDED[ADDRESS_BITS:0]), .condition(condition));
  hold_off_prescale stages (
      .clk(clk), .rst(rst), .condition(condition), .hold_off(HOLD_OFF),
      .rearm_level(REARM_LEVEL), .prescale(PRESCALE), .fire(fire), .held_off(held_off),
      .prescaled(prescaled));
endmodule
`default_nettype wire
