// Self-checking bench for a trigger with plain ports: drives the stimuli of a file, compares what
// fires with the expectation of a file, clock by clock, and prints one line of totals.
// settings.vh defines TRIGGER (module), PARAMETERS (its parameter list), BENCH_CHANNELS and CLOCKS.
`timescale 1ns / 1ns
`include "settings.vh"
module firing_bench;
  reg clk = 1'b0;
  reg rst = 1'b1;
  reg  [16*`BENCH_CHANNELS-1:0] samples = 0;
  wire condition, fire, held_off, prescaled;

  reg [16*`BENCH_CHANNELS-1:0] stimuli [0:`CLOCKS-1];
  reg [3:0]                    expected[0:`CLOCKS-1];  // {0, prescaled, held_off, fire}

  `TRIGGER #(`PARAMETERS) dut (
      .clk(clk), .rst(rst), .samples(samples), .condition(condition), .fire(fire),
      .held_off(held_off), .prescaled(prescaled));

  integer s;
  integer firings = 0;
  integer differences = 0;

  initial begin
    $readmemh("stimuli.hex", stimuli);
    $readmemh("expected.hex", expected);
    #5 clk = 1'b1;  // the reset is taken here
    #5 clk = 1'b0;
    rst = 1'b0;
    for (s = 0; s < `CLOCKS; s = s + 1) begin
      samples = stimuli[s];
      #5 clk = 1'b1;
      #4;  // just before the next sample
      if (fire) firings = firings + 1;
      if ({1'b0, prescaled, held_off, fire} !== expected[s]) begin
        differences = differences + 1;
        if (differences <= 10)
          $display("sample %0d: prescaled, held_off, fire are %b, expected %b", s,
                   {prescaled, held_off, fire}, expected[s][2:0]);
      end
      #1 clk = 1'b0;
    end
    $display("clocks %0d firings %0d differences %0d", s, firings, differences);
    $finish;
  end
endmodule
