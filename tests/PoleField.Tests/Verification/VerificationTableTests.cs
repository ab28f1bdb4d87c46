// Truth: the table beside the tests and the cases the tests declare name each other.
using Xunit;

namespace PoleField.Tests.Verification;

public class VerificationTableTests
{
    [Fact]
    public void TableListsEveryCaseAndNoOther()
    {
        string[] declared = [.. VerificationTable.Cases().Select(c => c.Title).Order(StringComparer.Ordinal)];
        string[] listed = [.. VerificationTable.Rows().Select(r => r.Title).Distinct().Order(StringComparer.Ordinal)];

        Assert.Equal(declared.Distinct(), declared);
        Assert.Equal(declared, listed);
    }
}
