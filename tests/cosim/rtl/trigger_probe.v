// Test bench only: one trigger whose settings are ports, so that one model serves any settings,
// with three twins of its condition, each easier by one (count, sample, channel), that tell how
// narrowly the real one missed.
`default_nettype none
module trigger_probe #(
    parameter KIND     = 0,     // 0 threshold, 1 time over threshold, 2 boxcar sum
    parameter CHANNELS = 4
) (
    input  wire                   clk,
    input  wire                   rst,
    input  wire [16*CHANNELS-1:0] samples,
    input  wire [16*CHANNELS-1:0] baseline,
    /* verilator lint_off UNUSED */  // no kind reads all of the settings below
    input  wire [32*CHANNELS-1:0] level,
    input  wire [32*CHANNELS-1:0] easier_level,
    input  wire [15:0]            reach_less_one,  // window or length
    input  wire [16:0]            min_over,
    input  wire [64*CHANNELS-1:0] sum,
    input  wire [64*CHANNELS-1:0] easier_sum,
    /* verilator lint_on UNUSED */
    input  wire [CHANNELS-1:0]    mask,
    input  wire [4:0]             majority,
    input  wire [31:0]            hold_off,
    input  wire                   rearm_level,
    input  wire [31:0]            prescale,
    output wire                   condition,
    output wire                   fire,
    output wire                   held_off,
    output wire                   prescaled,
    output wire                   one_count_easier,
    output wire                   one_sample_easier,
    output wire                   one_channel_easier
);
  wire [3:0] now;  // the condition, then its twins: level or sum, samples, channels
  wire [4:0] easier_majority = majority - 5'd1;

  genvar k;
  generate
    for (k = 0; k < 4; k = k + 1) begin : twin
      if (KIND == 0) begin : rule
        if (k == 2) begin : none  // a single sample has no fewer
          assign now[k] = 1'b0;
        end else begin : some
          threshold_condition #(.CHANNELS(CHANNELS)) one (
              .clk(clk), .rst(rst), .samples(samples), .baseline(baseline),
              .level(k == 1 ? easier_level : level), .mask(mask),
              .majority(k == 3 ? easier_majority : majority), .condition(now[k]));
        end
      end else if (KIND == 1) begin : rule
        time_over_threshold_condition #(.CHANNELS(CHANNELS), .DEPTH(65536)) one (
            .clk(clk), .rst(rst), .samples(samples), .baseline(baseline),
            .level(k == 1 ? easier_level : level), .mask(mask),
            .majority(k == 3 ? easier_majority : majority), .window_less_one(reach_less_one),
            .min_over(k == 2 ? min_over - 17'd1 : min_over), .condition(now[k]));
      end else begin : rule
        if (k == 2) begin : none  // one sample is not a step of the sum
          assign now[k] = 1'b0;
        end else begin : some
          boxcar_sum_condition #(.CHANNELS(CHANNELS), .DEPTH(65536)) one (
              .clk(clk), .rst(rst), .samples(samples), .baseline(baseline),
              .sum(k == 1 ? easier_sum : sum), .mask(mask),
              .majority(k == 3 ? easier_majority : majority), .length_less_one(reach_less_one),
              .condition(now[k]));
        end
      end
    end
  endgenerate

  hold_off_prescale stages (
      .clk(clk), .rst(rst), .condition(now[0]), .hold_off(hold_off),
      .rearm_level(rearm_level), .prescale(prescale), .fire(fire),
      .held_off(held_off), .prescaled(prescaled));

  assign condition          = now[0];
  assign one_count_easier   = now[1];
  assign one_sample_easier  = now[2];
  assign one_channel_easier = now[3];
endmodule
`default_nettype wire
