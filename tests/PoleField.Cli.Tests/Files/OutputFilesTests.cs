// Truth: the file system itself: names and contents before and after.
using PoleField.Cli.Files;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Files;

public sealed class OutputFilesTests
{
    private static readonly string[] Before = ["magnet.toml", "poles.dxf"];

    [Fact]
    public void NothingIsThereBeforeTheCommitAndAllOfItAfter()
    {
        using var folder = new CaseFolder();
        using OutputFiles files = OutputFiles.Plan([folder["a.svg"], folder["b.png"]], force: false);
        files.Write(folder["a.svg"], s => s.Write("a"u8));
        files.Write(folder["b.png"], s => s.Write("b"u8));

        Assert.DoesNotContain("a.svg", folder.Names);
        files.Commit(CancellationToken.None);

        Assert.Equal(["a.svg", "b.png", .. Before], folder.Names);
    }

    [Fact]
    public void WhatIsNotCommittedIsRemoved()
    {
        using var folder = new CaseFolder();
        using (OutputFiles files = OutputFiles.Plan([folder["a.svg"]], force: false))
        {
            files.Write(folder["a.svg"], s => s.Write("a"u8));
        }

        Assert.Equal(Before, folder.Names);
    }

    [Fact]
    public void AnInterruptedRunCommitsNothing()
    {
        using var folder = new CaseFolder();
        using (OutputFiles files = OutputFiles.Plan([folder["a.svg"]], force: false))
        {
            files.Write(folder["a.svg"], s => s.Write("a"u8));

            Assert.Throws<OperationCanceledException>(() => files.Commit(new CancellationToken(canceled: true)));
        }

        Assert.Equal(Before, folder.Names);
    }

    [Fact]
    public void EveryTargetThatCannotBeWrittenIsToldAtOnce()
    {
        using var folder = new CaseFolder();

        InputException e = Assert.Throws<InputException>(() => OutputFiles.Plan(
            [folder["magnet.toml"], folder[Path.Combine("poles.dxf", "a.svg")], Path.GetTempPath(), folder["good.svg"]], force: false));

        Assert.Equal(["file-exists", "cannot-write", "cannot-write"], e.Findings.Select(f => f.What));
        Assert.Equal(Before, folder.Names);
    }

    [Fact]
    public void AFileThatAppearsDuringTheRunIsNotReplaced()
    {
        using var folder = new CaseFolder();
        using (OutputFiles files = OutputFiles.Plan([folder["a.svg"], folder["b.svg"]], force: false))
        {
            files.Write(folder["a.svg"], s => s.Write("a"u8));
            files.Write(folder["b.svg"], s => s.Write("b"u8));
            File.WriteAllText(folder["b.svg"], "mine");

            Assert.Throws<InputException>(() => files.Commit(CancellationToken.None));
        }

        Assert.Equal("mine", File.ReadAllText(folder["b.svg"]));
        Assert.Equal(["b.svg", .. Before], folder.Names);
    }

    [Theory]
    [InlineData(null, "magnet.result.json")]
    [InlineData("out/", "out/magnet.result.json")]
    [InlineData("out", "out/magnet.result.json")] // no extension: a folder
    [InlineData("out.json", "out.json")]
    public void TheResultIsCalledAfterTheCaseUnlessAFileIsNamed(string? output, string expected) =>
        Assert.Equal(expected, ResultName.For("cases/magnet.toml", ".result.json", output).Replace('\\', '/'));
}
