// Threshold trigger with plain ports: fire rises after rising edge s for a firing at sample s.
`default_nettype none
module threshold #(
    parameter                     CHANNELS    = 4,
    parameter [16*CHANNELS-1:0]   BASELINE    = {CHANNELS{16'd200}},
    parameter [32*CHANNELS-1:0]   LEVEL       = {CHANNELS{32'd60}},
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
  threshold_condition #(.CHANNELS(CHANNELS)) rule (
      .clk(clk), .rst(rst), .samples(samples), .baseline(BASELINE), .level(LEVEL), .mask(MASK),
      .majority(MAJORITY), .condition(condition));
  hold_off_prescale stages (
      .clk(clk), .rst(rst), .condition(condition), .hold_off(HOLD_OFF),
      .rearm_level(REARM_LEVEL), .prescale(PRESCALE), .fire(fire), .held_off(held_off),
      .prescaled(prescaled));
endmodule
`default_nettype wire
